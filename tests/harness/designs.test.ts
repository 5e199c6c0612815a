import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  copyMatrix,
  countDistinctRows,
  matrixFromRows,
  orderByDescending,
  rowKey,
  rowView,
  stackRows,
  takeRows,
  zeros,
} from '../../harness/designs.js';
import { runs } from './arbitrary-space.js';

const matrix = matrixFromRows([
  [1, 2],
  [3, 4],
  [5, 6],
]);

describe('matrixFromRows(rows)', () => {
  test('lays rows one after another and copies them', () => {
    const row = Float64Array.of(7, 8);
    const made = matrixFromRows([row, [9, 10]]);
    row[0] = 0;
    expect(made).toEqual({ rows: 2, columns: 2, values: Float64Array.of(7, 8, 9, 10) });
  });

  test('keeps the number of columns it is told when there is no row', () => {
    expect(matrixFromRows([], 4)).toEqual(zeros(0, 4));
  });

  test('refuses rows of different length, naming the row', () => {
    expect(() => matrixFromRows([[1, 2], [3]])).toThrow(new RangeError('row 1 has 1 values, expected 2'));
  });
});

describe('rowView(matrix, i)', () => {
  test('is a window: writing to it writes to its row and no other', () => {
    const copy = copyMatrix(matrix);
    rowView(copy, 1).set([30, 40]);
    expect(copy.values).toEqual(Float64Array.of(1, 2, 30, 40, 5, 6));
  });
});

describe('takeRows(matrix, indices)', () => {
  test('copies the named rows in the order given, repeats included', () => {
    const taken = takeRows(matrix, [2, 0, 2]);
    expect(taken).toEqual(
      matrixFromRows([
        [5, 6],
        [1, 2],
        [5, 6],
      ]),
    );
    taken.values.fill(0);
    expect(matrix.values[4]).toBe(5);
  });

  test('takes no row as a matrix of 0 rows', () => {
    expect(takeRows(matrix, [])).toEqual(zeros(0, 2));
  });

  test.each([-1, 3, 0.5, Number.NaN])('refuses row %d of 3 instead of making one up', (i) => {
    expect(() => takeRows(matrix, [0, i])).toThrow(RangeError);
  });
});

describe('stackRows(parts)', () => {
  test('puts the rows of all parts one under another', () => {
    expect(stackRows([takeRows(matrix, [0]), zeros(0, 2), takeRows(matrix, [1, 2])])).toEqual(matrix);
  });

  test('refuses parts with different columns', () => {
    expect(() => stackRows([zeros(1, 2), zeros(1, 3)])).toThrow(
      new RangeError('cannot stack 3 columns under 2'),
    );
  });
});

describe('copyMatrix(matrix)', () => {
  test('shares no number with the original', () => {
    const copy = copyMatrix(matrix);
    copy.values.fill(0);
    expect(matrix.values).toEqual(Float64Array.of(1, 2, 3, 4, 5, 6));
  });
});

describe('rowKey(matrix, i)', () => {
  test('is equal exactly for rows with equal numbers', () => {
    const number = fc.oneof(
      fc.constantFrom(0, -0, 1, 11, 1e21, 0.1, 0.1 + 1e-17),
      fc.double({ noNaN: true }),
    );
    const row = fc.array(number, { minLength: 2, maxLength: 2 });
    fc.assert(
      fc.property(row, row, (a, b) => {
        const both = matrixFromRows([a, b]);
        expect(rowKey(both, 0) === rowKey(both, 1)).toBe(a.every((value, j) => value === b[j]));
      }),
      { ...runs, numRuns: 1000 },
    );
  });
});

describe('countDistinctRows(matrix)', () => {
  test('counts each row once, −0 and 0 as the same', () => {
    expect(
      countDistinctRows(
        matrixFromRows([
          [0, 1],
          [-0, 1],
          [1, 0],
        ]),
      ),
    ).toBe(2);
    expect(countDistinctRows(zeros(0, 3))).toBe(0);
  });
});

describe('orderByDescending(values)', () => {
  test('puts every row number once, values falling, equal values in their order', () => {
    const value = fc.oneof(
      fc.constantFrom(Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY),
      fc.integer({ min: 0, max: 3 }),
    );
    fc.assert(
      fc.property(fc.array(value), (values) => {
        const order = orderByDescending(values);
        expect([...order].sort((a, b) => a - b)).toEqual(values.map((_, i) => i));
        for (let k = 1; k < order.length; k++) {
          const [before, here] = [order[k - 1]!, order[k]!];
          const falling = values[before]! > values[here]!;
          expect(falling || (values[before] === values[here] && before < here)).toBe(true);
        }
      }),
      runs,
    );
  });
});
