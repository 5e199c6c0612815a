import { describe, expect, it } from 'vitest';
import { nemenyiDifference, nemenyiGroups } from '../../../results/statistics/nemenyi.js';
import {
  studentizedRangeCdf,
  studentizedRangeQuantile,
} from '../../../results/statistics/studentized-range.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

describe('studentizedRangeQuantile', () => {
  it('studentizedRangeQuantile(p, k) is SciPy’s and R’s at infinite degrees of freedom', () => {
    for (const row of reference.nemenyi_table.rows) {
      expect(studentizedRangeQuantile(0.95, row.k)).toBeCloseTo(row['alpha_0.05'].studentized_range_q, 8);
      expect(studentizedRangeQuantile(0.9, row.k)).toBeCloseTo(row['alpha_0.10'].studentized_range_q, 8);
    }
    // SciPy 1.17.1, studentized_range.ppf(p, k, inf).
    expect(studentizedRangeQuantile(0.999, 20)).toBeCloseTo(6.411187358406609, 9);
    expect(studentizedRangeQuantile(0.001, 6)).toBeCloseTo(0.5347362724764779, 9);
    expect(studentizedRangeQuantile(0.95, 50)).toBeCloseTo(5.646026026380527, 9);
  });

  it('studentizedRangeCdf(q, k) is SciPy’s, from 0 at 0 to 1 far out', () => {
    // SciPy 1.17.1, studentized_range.cdf(q, k, inf).
    expect(studentizedRangeCdf(3.5, 4)).toBeCloseTo(0.9361236661430967, 12);
    expect(studentizedRangeCdf(5, 10)).toBeCloseTo(0.9851425621122164, 12);
    expect(studentizedRangeCdf(0.3, 3)).toBeCloseTo(0.024502266356518528, 12);
    expect(studentizedRangeCdf(4, 100)).toBeCloseTo(0.0299943127778449, 12);
    expect(studentizedRangeCdf(0, 3)).toBe(0);
    expect(studentizedRangeCdf(30, 3)).toBeCloseTo(1, 12);
    expect(() => studentizedRangeCdf(Number.NaN, 3)).toThrow(RangeError);
    expect(() => studentizedRangeQuantile(1, 3)).toThrow(RangeError);
    expect(() => studentizedRangeQuantile(0.5, 1)).toThrow(RangeError);
  });
});

describe('nemenyiDifference', () => {
  it('nemenyiDifference({ methods }) has the q of Demšar 2006, table 5, to its printed digits', () => {
    for (const row of reference.nemenyi_table.rows) {
      const q = (alpha: number) => nemenyiDifference({ methods: row.k, tasks: 10, alpha }).q;
      // A few printed entries are off by one in the last digit.
      expect(Math.abs(q(0.05) - row['alpha_0.05'].nemenyi_published)).toBeLessThan(0.00151);
      expect(Math.abs(q(0.1) - row['alpha_0.10'].nemenyi_published)).toBeLessThan(0.00151);
    }
  });

  it('nemenyiDifference({ methods: 4, tasks: 14 }) is 1.25 at 5 % and 1.12 at 10 %, as Demšar 2006 prints', () => {
    const expected = reference.demsar_2006.computed_from_published_ranks;
    const at = (alpha: number) => nemenyiDifference({ methods: 4, tasks: 14, alpha }).criticalDifference;
    expect(at(0.05)).toBeCloseTo(expected['CD_0.05'], 8);
    expect(at(0.1)).toBeCloseTo(expected['CD_0.10'], 8);
    expect(at(0.05).toFixed(2)).toBe(String(reference.demsar_2006.published['CD_0.05']));
    expect(at(0.1).toFixed(2)).toBe(String(reference.demsar_2006.published['CD_0.10']));
  });

  it('nemenyiDifference({ methods: 1 }) is refused', () => {
    expect(() => nemenyiDifference({ methods: 1, tasks: 3 })).toThrow('number of methods');
  });
});

describe('nemenyiGroups', () => {
  it('nemenyiGroups(ranks of Demšar 2006) joins all four at 5 %, and parts C4.5 from two of them at 10 %', () => {
    const ranks = reference.demsar_2006.computed_from_published_ranks.average_ranks;
    expect(nemenyiGroups(ranks, reference.demsar_2006.published['CD_0.05'])).toEqual([[3, 1, 2, 0]]);
    expect(nemenyiGroups(ranks, reference.demsar_2006.published['CD_0.10'])).toEqual([
      [3, 1, 2],
      [2, 0],
    ]);
  });

  it('nemenyiGroups(meanRanks, difference) leaves out groups within groups, and methods that stand alone', () => {
    expect(nemenyiGroups([1, 2, 3, 6], 1.5)).toEqual([
      [0, 1],
      [1, 2],
    ]);
    expect(nemenyiGroups([1, 2, 3], 1)).toEqual([]);
    expect(nemenyiGroups([2, 2], 0.5)).toEqual([[0, 1]]);
  });
});
