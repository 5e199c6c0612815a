import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { meanInterval, transformedFrom } from '../../../results/statistics/mean-interval.js';
import { studentInterval } from '../../../results/statistics/student-interval.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const scores = fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 1, maxLength: 12 });

function bounds(values: readonly number[]): { low: number; high: number } {
  const interval = meanInterval(values);
  if (interval.method === 'none') throw new Error('no interval');
  return interval;
}

describe('meanInterval', () => {
  it('meanInterval(values) says which method the number of values allows', () => {
    const methodOf = (n: number) => meanInterval(Array.from({ length: n }, (_, i) => i)).method;
    expect([1, 2, 7].map(methodOf)).toEqual(['none', 'student-t', 'student-t']);
    expect([transformedFrom, 8, 40].map(methodOf)).toEqual(Array(3).fill('transformed-t'));
    expect(transformedFrom).toBe(8);
  });

  it('meanInterval(one value) has no bounds at all', () => {
    expect(meanInterval([0.4])).toEqual({
      method: 'none',
      n: 1,
      mean: 0.4,
      level: 0.95,
    });
  });

  it('meanInterval(equal values) is constant, with both bounds at the value', () => {
    expect(meanInterval(new Float64Array(9).fill(0.1))).toEqual({
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
    const interval = meanInterval([1, 2, 3, 4, 5]);
    const t = reference.student_t.quantiles_by_df['4'][2]!;
    expect(interval).toMatchObject({ method: 'student-t', degreesOfFreedom: 4, n: 5 });
    expect(bounds([1, 2, 3, 4, 5]).high).toBeCloseTo(3 + t * Math.sqrt(0.5), 9);
  });

  it('meanInterval(values) refuses NaN with its position, and no values', () => {
    expect(() => meanInterval([1, Number.NaN])).toThrow('position 1 is NaN');
    expect(() => meanInterval([])).toThrow(RangeError);
    expect(() => meanInterval([1, 2], { level: 95 })).toThrow('level must lie between 0 and 1');
  });

  it('meanInterval(values) holds the mean between its bounds', () => {
    fc.assert(
      fc.property(scores, (values) => {
        const interval = meanInterval(values);
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

  it('meanInterval(8 exponential values) at 95 % covers the mean where Student and percentiles do not', () => {
    // Common practice: of 8 exponential values Student's interval covers the mean in about 90 % of samples.
    const draws = rootStream(2);
    const covered = { transformed: 0, student: 0 };
    for (let sample = 0; sample < 2000; sample++) {
      const values = Array.from({ length: 8 }, () => -Math.log(1 - draws.uniform()));
      const [ours, students] = [meanInterval(values), studentInterval(values)];
      if (ours.method !== 'transformed-t') throw new Error(ours.method);
      if (ours.low <= 1 && ours.high >= 1) covered.transformed++;
      if (students.low <= 1 && students.high >= 1) covered.student++;
    }
    expect(covered.student / 2000).toBeLessThan(0.92);
    expect(covered.transformed / 2000).toBeGreaterThan(0.93);
  });

  it('meanInterval(6 normal values) at 90 % covers the mean in 90 % of samples', () => {
    const draws = rootStream(3);
    let covered = 0;
    for (let sample = 0; sample < 2000; sample++) {
      const values = Array.from({ length: 6 }, () => 5 + 2 * draws.normal());
      const interval = meanInterval(values, { level: 0.9 });
      if (interval.method === 'student-t' && interval.low <= 5 && interval.high >= 5) covered++;
    }
    expect(Math.abs(covered / 2000 - 0.9)).toBeLessThan(3.5 * Math.sqrt((0.9 * 0.1) / 2000));
  });
});
