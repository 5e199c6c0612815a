import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { friedmanTest } from '../../../results/statistics/friedman.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const demsar = reference.demsar_2006;
const published = demsar.published_ranks.map((ranks) => ranks.map((rank) => -rank));

describe('friedmanTest', () => {
  it('friedmanTest(ranks of Demšar 2006) prints what the paper prints', () => {
    const result = friedmanTest(published);
    result.meanRanks.forEach((rank, j) => {
      expect(rank).toBeCloseTo(demsar.published.average_ranks[j]!, 3);
    });
    // The paper computed both from ranks rounded to three decimals.
    expect(Math.abs(result.chiSquare - demsar.published.chi2_F)).toBeLessThan(0.006);
    expect(Math.abs(result.F - demsar.published.F_F)).toBeLessThan(0.006);
    expect(result.degreesOfFreedom).toEqual(demsar.published.df);
  });

  it('friedmanTest(scores) ranks the AUCs of Demšar 2006, ties averaged, as SciPy 1.10.1 does', () => {
    for (const [scores, expected] of [
      [published, demsar.computed_from_published_ranks],
      [demsar.auc, demsar.computed_from_printed_auc],
    ] as const) {
      const result = friedmanTest(scores);
      result.meanRanks.forEach((rank, j) => {
        expect(rank).toBeCloseTo(expected.average_ranks[j]!, 12);
      });
      expect(result.chiSquare).toBeCloseTo(expected.chi2_F_no_tie_correction, 9);
      expect(result.F).toBeCloseTo(expected.F_F, 9);
      expect(result.p).toBeCloseTo(expected.p_F, 9);
      const corrected = friedmanTest(scores, { tieCorrected: true });
      expect(corrected.chiSquare).toBeCloseTo(expected.chi2_tie_corrected, 9);
    }
  });

  it('friedmanTest(scores) looks at ranks within tasks alone', () => {
    const rows = fc.array(fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 3, maxLength: 3 }), {
      minLength: 2,
      maxLength: 8,
    });
    fc.assert(
      fc.property(rows, (scores) => {
        const result = friedmanTest(scores);
        const rescaled = scores.map((row, t) => row.map((score) => Math.exp(score / 10) * (t + 1) - 7 * t));
        expect(friedmanTest(rescaled)).toEqual(result);
        const reversed = friedmanTest(scores.toReversed().map((row) => row.toReversed()));
        expect(reversed.chiSquare).toBeCloseTo(result.chiSquare, 9);
        expect(result.meanRanks.reduce((sum, rank) => sum + rank, 0)).toBeCloseTo(6, 9);
        expect(result.p).toBeGreaterThan(0);
        expect(result.p).toBeLessThanOrEqual(1);
      }),
    );
  });

  it('friedmanTest(tasks in full agreement) has an infinite F and the exact chance of agreeing', () => {
    // By hand: tasks 2 to 4 repeat one of 3! rankings; with two of three scores tied, one of 3.
    const result = friedmanTest([1, 2, 3, 4].map((task) => [task, 2 * task, 3 * task]));
    expect(result).toMatchObject({ F: Infinity, chiSquare: 8, meanRanks: [3, 2, 1] });
    expect(result.p).toBeCloseTo(6 ** -3, 12);
    const tied = friedmanTest(
      [1, 2, 3, 4].map((task) => [task, task, 3 * task]),
      { tieCorrected: true },
    );
    expect(tied.F).toBe(Infinity);
    expect(tied.p).toBeCloseTo(3 ** -3, 12);
  });

  it('friedmanTest(all scores tied) finds nothing', () => {
    for (const tieCorrected of [false, true]) {
      const result = friedmanTest(
        [
          [1, 1],
          [2, 2],
          [0, 0],
        ],
        { tieCorrected },
      );
      expect(result).toMatchObject({ chiSquare: 0, F: 0, p: 1, meanRanks: [1.5, 1.5] });
    }
  });

  it('friedmanTest(scores) refuses NaN with its place, ragged rows, and a single task or method', () => {
    expect(() =>
      friedmanTest([
        [1, 2],
        [1, Number.NaN],
      ]),
    ).toThrow('scores of task 1: position 1 is NaN');
    expect(() => friedmanTest([[1, 2], [1]])).toThrow('task 1 has 1 scores, expected 2');
    expect(() => friedmanTest([[1, 2]])).toThrow(
      'number of tasks must be a whole number of at least 2, got 1',
    );
    expect(() => friedmanTest([[1], [2]])).toThrow('number of methods');
  });
});
