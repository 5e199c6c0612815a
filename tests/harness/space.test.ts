import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { rootStream, type Stream } from '../../harness/random.js';
import {
  type Column,
  countValues,
  findBreach,
  isDiscrete,
  makeSpace,
  sampleColumn,
  sampleUniform,
  sequenceSpace,
} from '../../harness/space.js';
import { arbitraryDesigns, runs } from './arbitrary-space.js';
import { misfit, tally } from './chi-square.js';

const length: Column = { kind: 'continuous', name: 'length', low: -1, high: 2 };
const count: Column = { kind: 'integer', name: 'count', low: -2, high: 7 };
const colour: Column = { kind: 'category', name: 'colour', levels: ['red', 'green', 'blue'] };
const space = makeSpace([length, count, colour]);

/** A stream stuck at one uniform number. */
function stuckAt(u: number): Stream {
  return { ...rootStream(1), uniform: () => u };
}

describe('makeSpace(columns)', () => {
  const inf = Number.POSITIVE_INFINITY;
  test.each<[string, readonly Column[], RegExp]>([
    ['no column', [], /at least one column/],
    ['two columns of one name', [length, { ...count, name: 'length' }], /two columns are named "length"/],
    ['low above high', [{ ...length, low: 3 }], /"length" needs finite bounds with low < high, got 3 and 2/],
    ['low equal to high', [{ ...count, low: 7 }], /"count" needs finite bounds with low < high, got 7 and 7/],
    ['an infinite bound', [{ ...length, high: inf }], /"length" needs finite bounds/],
    ['a bound that is not a number', [{ ...length, low: Number.NaN }], /"length" needs finite bounds/],
    [
      'a fractional bound of an integer column',
      [{ ...count, low: 0.5 }],
      /"count" needs whole-number bounds/,
    ],
    ['a single level', [{ ...colour, levels: ['red'] }], /"colour" needs at least two levels/],
    ['a level named twice', [{ ...colour, levels: ['red', 'red'] }], /"colour" repeats a level/],
  ])('refuses %s', (_, columns, message) => {
    expect(() => makeSpace(columns)).toThrow(RangeError);
    expect(() => makeSpace(columns)).toThrow(message);
  });

  test('keeps the columns in their order', () => {
    expect(space.columns).toEqual([length, count, colour]);
  });
});

describe('sequenceSpace(length, alphabet)', () => {
  test('has one category column a site', () => {
    expect(sequenceSpace(2, ['A', 'C']).columns).toEqual([
      { kind: 'category', name: 'site1', levels: ['A', 'C'] },
      { kind: 'category', name: 'site2', levels: ['A', 'C'] },
    ]);
    expect(isDiscrete(sequenceSpace(2, ['A', 'C']))).toBe(true);
    expect(isDiscrete(space)).toBe(false);
  });
});

describe('countValues(column)', () => {
  test('counts both ends of an integer column, the levels of a category, and never ends on a continuous one', () => {
    expect(space.columns.map(countValues)).toEqual([Number.POSITIVE_INFINITY, 10, 3]);
  });
});

describe('sampleUniform(space, rows, stream)', () => {
  test('draws inside every space', () => {
    fc.assert(
      fc.property(arbitraryDesigns(20), ({ space, designs }) => {
        expect(findBreach(space, designs)).toBeUndefined();
      }),
      runs,
    );
  });

  test('draws bins of a range, whole numbers with both ends, and levels equally often, independently', () => {
    const designs = sampleUniform(space, 40_000, rootStream(2));
    const column = (j: number) => {
      let i = 0;
      return () => designs.values[3 * i++ + j]!;
    };
    const [x, k, level] = [column(0), column(1), column(2)];
    expect(misfit(tally(10, 40_000, () => Math.floor(((x() + 1) / 3) * 10)))).toBeLessThan(1);
    expect(misfit(tally(10, 40_000, () => k() + 2))).toBeLessThan(1);
    expect(misfit(tally(3, 40_000, level))).toBeLessThan(1);
    const [again, otherNumber] = [column(0), column(1)];
    const cell = () => 10 * Math.floor(((again() + 1) / 3) * 10) + otherNumber() + 2;
    expect(misfit(tally(100, 40_000, cell))).toBeLessThan(1);
  });

  test('gives the same designs for the same stream, and a shorter draw is the start of a longer', () => {
    const long = sampleUniform(space, 30, rootStream(3));
    expect(sampleUniform(space, 30, rootStream(3))).toEqual(long);
    expect(sampleUniform(space, 10, rootStream(3)).values).toEqual(long.values.slice(0, 30));
  });

  test('never rounds a continuous value past its bound', () => {
    const almostOne = 1 - 2 ** -53;
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-12, max: 1e6, noNaN: true }),
        (low, width) => {
          fc.pre(low + width > low);
          const column: Column = { kind: 'continuous', name: 'x', low, high: low + width };
          expect(sampleColumn(column, stuckAt(almostOne))).toBeLessThanOrEqual(column.high);
        },
      ),
      { ...runs, numRuns: 500 },
    );
  });
});

describe('findBreach(space, designs)', () => {
  const fine = [0, 0, 0];

  test('is undefined for designs inside, bounds included, and for no designs', () => {
    const inside = matrixFromRows([fine, [-1, -2, 0], [2, 7, 2]]);
    expect(findBreach(space, inside)).toBeUndefined();
    expect(findBreach(space, matrixFromRows([], 3))).toBeUndefined();
  });

  test.each([
    ['length', 0, Number.NaN, 'is not a finite number'],
    ['length', 0, Number.POSITIVE_INFINITY, 'is not a finite number'],
    ['length', 0, -1.0000001, 'lies outside -1 to 2'],
    ['length', 0, 2.0000001, 'lies outside -1 to 2'],
    ['count', 1, Number.NaN, 'is not a finite number'],
    ['count', 1, 0.5, 'is not a whole number'],
    ['count', 1, -3, 'lies outside -2 to 7'],
    ['count', 1, 8, 'lies outside -2 to 7'],
    ['colour', 2, Number.NEGATIVE_INFINITY, 'is not a finite number'],
    ['colour', 2, 3, 'is not the index of one of 3 levels'],
    ['colour', 2, -1, 'is not the index of one of 3 levels'],
    ['colour', 2, 0.5, 'is not the index of one of 3 levels'],
  ])('finds on column %s (%i) the value %d that %s', (column, j, value, problem) => {
    const row = fine.map((kept, k) => (k === j ? value : kept));
    expect(findBreach(space, matrixFromRows([fine, row, row]))).toEqual({ row: 1, column, value, problem });
  });
});
