import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { rootStream } from '../../harness/random.js';
import { type Column, findBreach } from '../../harness/space.js';
import { mutateInPlace, mutateValue, reflect } from '../../methods/mutation.js';

const columns: readonly Column[] = [
  { kind: 'continuous', name: 'heat', low: -3, high: 8 },
  { kind: 'integer', name: 'cycles', low: 2, high: 9 },
  { kind: 'integer', name: 'switch', low: 0, high: 1 },
  { kind: 'category', name: 'base', levels: ['A', 'C', 'G', 'T'] },
];

describe('mutateInPlace(row, space, size, stream)', () => {
  test('stays inside the space, however large the step', () => {
    fc.assert(
      fc.property(fc.integer(), fc.double({ min: 1e-6, max: 50, noNaN: true }), (seed, step) => {
        const row = Float64Array.of(8, 2, 1, 3);
        mutateInPlace(row, { columns }, { changes: 4, step, atLeastOne: false }, rootStream(seed));
        expect(findBreach({ columns }, matrixFromRows([row]))).toBeUndefined();
      }),
    );
  });

  test('changes nothing with no changes asked for, and one column with atLeastOne', () => {
    for (let seed = 0; seed < 50; seed++) {
      const [still, moved] = [Float64Array.of(8, 2, 1, 3), Float64Array.of(8, 2, 1, 3)];
      mutateInPlace(still, { columns }, { changes: 0, step: 0.1, atLeastOne: false }, rootStream(seed));
      mutateInPlace(moved, { columns }, { changes: 0, step: 0.1, atLeastOne: true }, rootStream(seed));
      expect(still).toEqual(Float64Array.of(8, 2, 1, 3));
      expect(moved.filter((value, j) => value !== still[j])).toHaveLength(1);
    }
  });
});

describe('mutateValue(column, value, step, stream)', () => {
  test('always changes a whole number, and takes every other one in time', () => {
    const stream = rootStream(1);
    const seen = new Set(Array.from({ length: 300 }, () => mutateValue(columns[1]!, 5, 0.3, stream)));
    expect([...seen].sort()).toEqual([2, 3, 4, 6, 7, 8, 9]);
    expect(mutateValue(columns[2]!, 0, 0.3, stream)).toBe(1);
  });

  test('takes each other level of a category as often', () => {
    const stream = rootStream(1);
    const counts = [0, 0, 0, 0];
    for (let i = 0; i < 3000; i++) counts[mutateValue(columns[3]!, 2, 0.1, stream)]!++;
    expect(counts[2]).toBe(0);
    // Binomial(3000, 1/3): five standard deviations are 129.
    for (const level of [0, 1, 3]) expect(Math.abs(counts[level]! - 1000)).toBeLessThan(129);
  });
});

describe('reflect(value, low, high)', () => {
  test.each([
    [1.25, 0, 1, 0.75],
    [-0.25, 0, 1, 0.25],
    [2.25, 0, 1, 0.25],
    [-1.25, 0, 1, 0.75],
    [10, 2, 4, 2],
    [3, 2, 4, 3],
  ])('folds %d into [%d, %d] as %d', (value, low, high, expected) => {
    expect(reflect(value, low, high)).toBe(expected);
  });
});
