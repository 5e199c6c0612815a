import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { performanceProfile } from '../../../results/statistics/performance-profile.js';

const options = (thresholds: ArrayLike<number>, resamples = 2000) => ({
  thresholds,
  resamples,
  stream: rootStream(1),
});

describe('performanceProfile', () => {
  it('performanceProfile(tasks) is the share of runs strictly above, tasks weighing the same', () => {
    // By hand: above 2 lie ½ of task 0 and ¼ of task 1.
    const { shares, tasks } = performanceProfile(
      [
        [1, 3],
        [2, 2, 2, 4],
      ],
      options([2, 0, 4]),
    );
    expect(shares[0]).toBeCloseTo((1 / 2 + 1 / 4) / 2, 12);
    expect(shares.slice(1)).toEqual([1, 0]);
    expect(tasks).toBe(2);
  });

  it('performanceProfile(tasks) falls with the threshold, and its band holds it', () => {
    const runs = fc.array(fc.double({ min: -1, max: 2, noNaN: true }), { minLength: 1, maxLength: 8 });
    const thresholds = Array.from({ length: 13 }, (_, i) => -1 + i / 4);
    fc.assert(
      fc.property(fc.array(runs, { minLength: 1, maxLength: 4 }), (tasks) => {
        const { shares, low, high } = performanceProfile(tasks, options(thresholds, 300));
        shares.forEach((share, j) => {
          expect(share).toBeGreaterThanOrEqual(0);
          expect(share).toBeLessThanOrEqual(1);
          expect(low[j]!).toBeLessThanOrEqual(share + 1e-12);
          expect(high[j]!).toBeGreaterThanOrEqual(share - 1e-12);
          if (j > 0) expect(share).toBeLessThanOrEqual(shares[j - 1]! + 1e-12);
        });
      }),
      { numRuns: 40 },
    );
  });

  it('performanceProfile(one task) has the band of a binomial share', () => {
    // 28 of 40 above 0: binomial quantiles at 2.5 and 97.5 % are 22 and 33 of 40 (SciPy 1.17.1).
    const scores = Array.from({ length: 40 }, (_, i) => (i < 28 ? 1 : -1));
    const { low, high, level } = performanceProfile([scores], options([0]));
    expect(Math.round(low[0]! * 40)).toBe(22);
    expect(Math.round(high[0]! * 40)).toBe(33);
    expect(level).toBe(0.95);
  });

  it('performanceProfile(tasks) resamples runs and never tasks', () => {
    const { shares, low, high } = performanceProfile(
      [
        [0, 0],
        [1, 1, 1],
      ],
      options([0.5]),
    );
    expect([shares[0], low[0], high[0]]).toEqual([0.5, 0.5, 0.5]);
  });

  it('performanceProfile(tasks) refuses NaN in scores and thresholds', () => {
    expect(() => performanceProfile([[1], [Number.NaN]], options([0]))).toThrow(
      'runs of task 1: position 0 is NaN',
    );
    expect(() => performanceProfile([[1]], options([0, Number.NaN]))).toThrow(
      'thresholds: position 1 is NaN',
    );
    expect(() => performanceProfile([[1]], options([]))).toThrow(RangeError);
  });
});
