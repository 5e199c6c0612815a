import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { bootstrapFrom, meanInterval } from '../../../results/statistics/mean-interval.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const stream = () => rootStream(1);
const scores = fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 1, maxLength: 12 });

function bounds(values: readonly number[]): { low: number; high: number } {
  const interval = meanInterval(values, { resamples: 400, stream: stream() });
  if (interval.method === 'none') throw new Error('no interval');
  return interval;
}

describe('meanInterval', () => {
  it('meanInterval(values) says which method the number of values allows', () => {
    const methodOf = (n: number) =>
      meanInterval(
        Array.from({ length: n }, (_, i) => i),
        { stream: stream() },
      ).method;
    expect([1, 2, 7, 8, 40].map(methodOf)).toEqual(['none', 'student-t', 'student-t', 'bca', 'bca']);
    expect(bootstrapFrom).toBe(8);
  });

  it('meanInterval(one value) has no bounds at all', () => {
    expect(meanInterval([0.4], { stream: stream() })).toEqual({
      method: 'none',
      n: 1,
      mean: 0.4,
      level: 0.95,
    });
  });

  it('meanInterval(equal values) is constant, with both bounds at the value', () => {
    expect(meanInterval(new Float64Array(9).fill(0.1), { stream: stream() })).toEqual({
      method: 'constant',
      n: 9,
      mean: 0.1,
      level: 0.95,
      low: 0.1,
      high: 0.1,
    });
  });

  it('meanInterval(five values) is mean ± t(0.975, 4) · s/√5 (SciPy 1.10.1)', () => {
    // 1 … 5: mean 3, s²/n = 0.5.
    const interval = meanInterval([1, 2, 3, 4, 5], { stream: stream() });
    const t = reference.student_t.quantiles_by_df['4'][2]!;
    expect(interval).toMatchObject({ method: 'student-t', degreesOfFreedom: 4, n: 5 });
    expect(bounds([1, 2, 3, 4, 5]).high).toBeCloseTo(3 + t * Math.sqrt(0.5), 9);
  });

  it('meanInterval(values) refuses NaN with its position, and no values', () => {
    expect(() => meanInterval([1, Number.NaN], { stream: stream() })).toThrow('position 1 is NaN');
    expect(() => meanInterval([], { stream: stream() })).toThrow(RangeError);
    expect(() => meanInterval([1, 2], { level: 95, stream: stream() })).toThrow(
      'level must lie between 0 and 1',
    );
  });

  it('meanInterval(values) holds the mean between its bounds and is the same for the same stream', () => {
    fc.assert(
      fc.property(scores, (values) => {
        const interval = meanInterval(values, { resamples: 400, stream: stream() });
        expect(meanInterval(values, { resamples: 400, stream: stream() })).toEqual(interval);
        if (interval.method === 'none') return;
        expect(interval.low).toBeLessThanOrEqual(interval.mean + 1e-9);
        expect(interval.high).toBeGreaterThanOrEqual(interval.mean - 1e-9);
      }),
      { numRuns: 60 },
    );
  });

  it('meanInterval(values) moves with a shift and stretches with a factor', () => {
    // Whole numbers, so that a shifted copy isn't rounded differently.
    const whole = fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 2, maxLength: 12 });
    fc.assert(
      fc.property(
        whole,
        fc.integer({ min: -9, max: 9 }),
        fc.constantFrom(0.25, 2, 8),
        (values, shift, factor) => {
          const before = bounds(values);
          const after = bounds(values.map((value) => factor * value + shift));
          expect(after.low).toBeCloseTo(factor * before.low + shift, 8);
          expect(after.high).toBeCloseTo(factor * before.high + shift, 8);
        },
      ),
      { numRuns: 60 },
    );
  });

  it('meanInterval(16 normal values) at 95 % covers the mean as often as theory says', () => {
    // The bootstrap's spread is √((n − 1)/n) of the usual standard error and its quantiles are normal rather than t:
    // P(|t₁₅| < 1.960 · √(15/16)) = 0.9229 (SciPy 1.17.1). Within 3.5 standard errors of 500 samples.
    const draws = rootStream(2);
    let covered = 0;
    for (let sample = 0; sample < 500; sample++) {
      const values = Array.from({ length: 16 }, () => draws.normal());
      const interval = meanInterval(values, { resamples: 1000, stream: draws.split('bootstrap', sample) });
      if (interval.method === 'bca' && interval.low <= 0 && interval.high >= 0) covered++;
    }
    const standardError = Math.sqrt((0.9229 * 0.0771) / 500);
    expect(Math.abs(covered / 500 - 0.9229)).toBeLessThan(3.5 * standardError);
  });

  it('meanInterval(6 normal values) at 90 % covers the mean in 90 % of samples', () => {
    const draws = rootStream(3);
    let covered = 0;
    for (let sample = 0; sample < 2000; sample++) {
      const values = Array.from({ length: 6 }, () => 5 + 2 * draws.normal());
      const interval = meanInterval(values, { level: 0.9, stream: draws });
      if (interval.method === 'student-t' && interval.low <= 5 && interval.high >= 5) covered++;
    }
    expect(Math.abs(covered / 2000 - 0.9)).toBeLessThan(3.5 * Math.sqrt((0.9 * 0.1) / 2000));
  });
});
