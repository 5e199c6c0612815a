import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { copyMatrix, type Matrix, matrixFromRows, rowView, zeros } from '../../harness/designs.js';
import { decode, type Encoding, encode, makeEncoding, projectInPlace, snap } from '../../harness/encoding.js';
import { findBreach, makeSpace, type Space } from '../../harness/space.js';
import { arbitraryDesigns, arbitrarySpace, runs } from './arbitrary-space.js';

const space = makeSpace([
  { kind: 'continuous', name: 'x', low: 10, high: 30 },
  { kind: 'category', name: 'c', levels: ['a', 'b', 'c'] },
  { kind: 'integer', name: 'k', low: -1, high: 3 },
]);
const encoding = makeEncoding(space);

/** A space with encoded rows that need not stand for a design. */
function arbitraryEncoded(size: fc.Arbitrary<number>): fc.Arbitrary<{ encoding: Encoding; encoded: Matrix }> {
  return arbitrarySpace().chain((space) => {
    const encoding = makeEncoding(space);
    return fc.array(size, { minLength: 3 * encoding.width, maxLength: 3 * encoding.width }).map((values) => ({
      encoding,
      encoded: { rows: 3, columns: encoding.width, values: Float64Array.from(values) },
    }));
  });
}

const near = fc.double({ min: -3, max: 3, noNaN: true });
const far = fc.oneof(near, fc.double({ min: -1e18, max: 1e18, noNaN: true }));

function projected(encoding: Encoding, encoded: Matrix): Matrix {
  const copy = copyMatrix(encoded);
  projectInPlace(encoding, copy);
  return copy;
}

describe('makeEncoding(space)', () => {
  test('gives one feature a number column and one a level, side by side', () => {
    expect(encoding.blocks.map(({ offset, width }) => [offset, width])).toEqual([
      [0, 1],
      [1, 3],
      [4, 1],
    ]);
    expect(encoding.width).toBe(5);
  });
});

describe('encode(encoding, designs)', () => {
  test('scales numbers to [0, 1] and sets 1 at the level', () => {
    const designs = matrixFromRows([
      [10, 0, 3],
      [25, 2, 0],
    ]);
    expect(encode(encoding, designs)).toEqual(
      matrixFromRows([
        [0, 1, 0, 0, 1],
        [0.75, 0, 0, 1, 0.25],
      ]),
    );
  });

  test('leaves the designs as they were', () => {
    fc.assert(
      fc.property(arbitraryDesigns(3), ({ space, designs }) => {
        const before = copyMatrix(designs);
        encode(makeEncoding(space), designs);
        expect(designs).toEqual(before);
      }),
      runs,
    );
  });
});

describe('decode(encoding, encoded)', () => {
  test('decode(encode(x)) is x: exactly for whole numbers and levels, to rounding for the rest', () => {
    fc.assert(
      fc.property(arbitraryDesigns(10), ({ space, designs }) => {
        const encoding = makeEncoding(space);
        expectSameDesigns(space, decode(encoding, encode(encoding, designs)), designs);
      }),
      { ...runs, numRuns: 500 },
    );
  });

  test('gives designs inside the space, whatever the finite features', () => {
    fc.assert(
      fc.property(arbitraryEncoded(far), ({ encoding, encoded }) => {
        const before = copyMatrix(encoded);
        expect(findBreach(encoding.space, decode(encoding, encoded))).toBeUndefined();
        expect(encoded).toEqual(before);
      }),
      runs,
    );
  });

  test('cuts to the bounds, rounds whole numbers and takes the first of the largest levels', () => {
    const encoded = matrixFromRows([
      [-0.5, 0.2, 0.4, 0.4, 0.3],
      [1.5, -3, -2, -1, 0.4],
    ]);
    expect(decode(encoding, encoded)).toEqual(
      matrixFromRows([
        [10, 1, 0],
        [30, 2, 1],
      ]),
    );
  });

  test.each([0, 1, 2, 3, 4])(
    'passes on a feature %i that is not a number instead of choosing a design',
    (k) => {
      const encoded = matrixFromRows([[0.5, 0, 1, 0, 0.5]]);
      encoded.values[k] = Number.NaN;
      expect(findBreach(space, decode(encoding, encoded))?.problem).toBe('is not a finite number');
      expect(snap(encoding, encoded).values.some(Number.isNaN)).toBe(true);
    },
  );

  test('never gives −0', () => {
    const column = makeSpace([{ kind: 'integer', name: 'k', low: -1, high: 1 }]);
    expect(Object.is(decode(makeEncoding(column), matrixFromRows([[0.4]])).values[0], 0)).toBe(true);
  });
});

describe('snap(encoding, encoded)', () => {
  test('is idempotent, to rounding on continuous columns', () => {
    fc.assert(
      fc.property(arbitraryEncoded(near), ({ encoding, encoded }) => {
        const once = snap(encoding, encoded);
        const twice = snap(encoding, once);
        expectSameDesigns(encoding.space, decode(encoding, twice), decode(encoding, once));
        expect(encodedDistance(once, twice)).toBeLessThan(1e-6);
      }),
      runs,
    );
  });

  test('leaves the encoding of a design where it is', () => {
    const encoded = encode(encoding, matrixFromRows([[17, 1, 2]]));
    expect(snap(encoding, encoded)).toEqual(encoded);
  });

  test('moves to no design farther than another of the same space', () => {
    const discrete = makeSpace(space.columns.slice(1));
    const all = [0, 1, 2].flatMap((c) => [-1, 0, 1, 2, 3].map((k) => [c, k]));
    const encoding = makeEncoding(discrete);
    const options = all.map((design) => encode(encoding, matrixFromRows([design])));
    fc.assert(
      fc.property(fc.array(near, { minLength: 4, maxLength: 4 }), (row) => {
        const encoded = matrixFromRows([row]);
        const nearest = Math.min(...options.map((option) => encodedDistance(option, encoded)));
        expect(encodedDistance(snap(encoding, encoded), encoded)).toBeCloseTo(nearest, 12);
      }),
      runs,
    );
  });
});

describe('projectInPlace(encoding, encoded)', () => {
  test('gives shares in [0, 1] and levels that are not negative and sum to 1, however far away it starts', () => {
    fc.assert(
      fc.property(arbitraryEncoded(far), ({ encoding, encoded }) => {
        const moved = projected(encoding, encoded);
        for (let i = 0; i < moved.rows; i++) {
          for (const { column, offset, width } of encoding.blocks) {
            const features = rowView(moved, i).subarray(offset, offset + width);
            expect(features.every((value) => value >= 0 && value <= 1)).toBe(true);
            if (column.kind !== 'category') continue;
            expect(features.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1, 12);
          }
        }
      }),
      { ...runs, numRuns: 500 },
    );
  });

  test('is idempotent', () => {
    fc.assert(
      fc.property(arbitraryEncoded(far), ({ encoding, encoded }) => {
        const once = projected(encoding, encoded);
        expect(encodedDistance(projected(encoding, once), once)).toBeLessThan(1e-14);
      }),
      runs,
    );
  });

  test('leaves encoded designs exactly as they are', () => {
    fc.assert(
      fc.property(arbitraryDesigns(3), ({ space, designs }) => {
        const encoding = makeEncoding(space);
        const encoded = encode(encoding, designs);
        expect(projected(encoding, encoded)).toEqual(encoded);
      }),
      runs,
    );
  });

  test('finds the nearest point of the simplex, checked against every choice of positive levels', () => {
    const category = makeSpace([{ kind: 'category', name: 'c', levels: ['a', 'b', 'c', 'd'] }]);
    fc.assert(
      fc.property(fc.array(near, { minLength: 4, maxLength: 4 }), (point) => {
        const { values } = projected(makeEncoding(category), matrixFromRows([point]));
        const nearest = nearestOnSimplex(point);
        values.forEach((value, k) => {
          expect(value).toBeCloseTo(nearest[k]!, 12);
        });
      }),
      { ...runs, numRuns: 500 },
    );
  });

  test('keeps what is not a number', () => {
    const encoded = matrixFromRows([[Number.NaN, 0, Number.NaN, 0, 0]]);
    projectInPlace(encoding, encoded);
    expect(encoded.values[0]).toBeNaN();
    expect(encoded.values[2]).toBeNaN();
  });

  test('accepts no rows', () => {
    const none = zeros(0, encoding.width);
    projectInPlace(encoding, none);
    expect(none.rows).toBe(0);
  });
});

function expectSameDesigns(space: Space, actual: Matrix, expected: Matrix): void {
  expect([actual.rows, actual.columns]).toEqual([expected.rows, expected.columns]);
  expected.values.forEach((value, index) => {
    const column = space.columns[index % expected.columns]!;
    if (column.kind !== 'continuous') {
      expect(actual.values[index]).toBe(value);
      return;
    }
    const rounding = 4 * Number.EPSILON * Math.max(Math.abs(column.low), Math.abs(column.high));
    const tolerance = 1e-12 * (column.high - column.low) + rounding;
    expect(Math.abs(actual.values[index]! - value)).toBeLessThanOrEqual(tolerance);
  });
}

function encodedDistance(a: Matrix, b: Matrix): number {
  return Math.sqrt(a.values.reduce((sum, value, k) => sum + (value - b.values[k]!) ** 2, 0));
}

/**
 * The projection onto the simplex by definition: for each set of positive levels the nearest point of the plane where
 * they sum to 1; of those without a negative level, the nearest.
 */
function nearestOnSimplex(point: readonly number[]): number[] {
  let nearest: number[] = [];
  let least = Number.POSITIVE_INFINITY;
  for (let set = 1; set < 2 ** point.length; set++) {
    const inSet = point.map((_, k) => (set >> k) % 2 === 1);
    const chosen = point.filter((_, k) => inSet[k]);
    const excess = (chosen.reduce((sum, value) => sum + value, 0) - 1) / chosen.length;
    const candidate = point.map((value, k) => (inSet[k] ? value - excess : 0));
    if (candidate.some((value) => value < 0)) continue;
    const distance = candidate.reduce((sum, value, k) => sum + (value - point[k]!) ** 2, 0);
    if (distance < least) {
      least = distance;
      nearest = candidate;
    }
  }
  return nearest;
}
