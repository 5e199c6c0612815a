import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readCsv, writeCsv } from '../../results/csv.js';

describe('writeCsv', () => {
  test('writes a header and a line a record, each ended by one line feed', async () => {
    expect(await writeCsv(['a', 'b'], [{ a: 1, b: 'x' }, { b: true }])).toBe('a,b\n1,x\n,true\n');
  });

  test('quotes by RFC 4180: commas, quotes and line ends', async () => {
    // RFC 4180 (2005), section 2, rules 6 and 7.
    expect(await writeCsv(['a'], [{ a: 'x,y' }, { a: 'say "hi"' }, { a: 'p\nq' }], { header: false })).toBe(
      '"x,y"\n"say ""hi"""\n"p\nq"\n',
    );
  });

  test('writes the header alone when there are no records, and nothing without a header', async () => {
    expect(await writeCsv(['a', 'b'], [])).toBe('a,b\n');
    expect(await writeCsv(['a', 'b'], [], { header: false })).toBe('');
  });
});

describe('readCsv', () => {
  test('gives back every text that writeCsv wrote, but for white space alone', async () => {
    const text = fc.string({ unit: 'grapheme', maxLength: 12 }).filter((it) => it === '' || it.trim() !== '');
    const records = fc.array(fc.record({ a: text, b: text, c: text }), { minLength: 1, maxLength: 6 });
    await fc.assert(
      fc.asyncProperty(records, async (rows) => {
        const columns = ['a', 'b', 'c'];
        const read = await readCsv(await writeCsv(columns, rows));
        expect(read).toEqual([columns, ...rows.map(({ a, b, c }) => [a, b, c])]);
      }),
    );
  });

  test('gives no lines for an empty text', async () => {
    expect(await readCsv('')).toEqual([]);
  });

  test('rejects a text whose quotes do not close', async () => {
    await expect(readCsv('a,b\n"x,y\n')).rejects.toThrow();
  });
});
