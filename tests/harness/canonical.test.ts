import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { canonicalJson, hashOf } from '../../harness/canonical.js';

describe('canonicalJson', () => {
  test('does not depend on the order in which keys were written, at any depth', () => {
    expect(canonicalJson({ b: [{ d: 1, c: 2 }], a: null })).toBe('{"a":null,"b":[{"c":2,"d":1}]}');
    fc.assert(
      fc.property(
        fc.dictionary(fc.string(), fc.jsonValue()),
        fc.infiniteStream(fc.nat()),
        (value, places) => {
          const entries = Object.entries(value).map((entry) => ({ entry, place: places.next().value }));
          entries.sort((a, b) => a.place - b.place);
          const shuffled = Object.fromEntries(entries.map(({ entry }) => entry));
          expect(canonicalJson(shuffled)).toBe(canonicalJson(value));
        },
      ),
    );
  });

  test('keeps the value', () => {
    fc.assert(
      fc.property(fc.jsonValue({ noUnicodeString: false }), (value) => {
        const plain: unknown = JSON.parse(JSON.stringify(value));
        expect(JSON.parse(canonicalJson(value))).toEqual(plain);
      }),
    );
  });

  test('leaves out keys that are undefined', () => {
    expect(canonicalJson({ a: undefined, b: 1 })).toBe('{"b":1}');
  });

  test('keeps the order of lists', () => {
    expect(canonicalJson([2, 1])).not.toBe(canonicalJson([1, 2]));
  });
});

describe('hashOf', () => {
  test('is the SHA-256 of the canonical text in hexadecimal', () => {
    // `printf '{"a":1,"b":"x"}' | sha256sum` (GNU coreutils 9).
    expect(hashOf({ b: 'x', a: 1 })).toBe('ecf9e98ec0641e23113ff3ce8bdc78d0ddd249886517fd4a7f68cc83d4e65667');
  });

  test('differs for values that differ', () => {
    const values = [null, {}, [], '', 0, '0', { a: 1 }, { a: '1' }, [1, 2], [2, 1]];
    expect(new Set(values.map(hashOf)).size).toBe(values.length);
  });
});
