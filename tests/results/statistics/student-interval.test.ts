import { describe, expect, it } from 'vitest';
import { moments } from '../../../results/statistics/moments.js';
import { studentInterval } from '../../../results/statistics/student-interval.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const depression = reference.wilcoxon_signed_rank.hollander_wolfe_depression;

describe('studentInterval', () => {
  it('studentInterval(values) gives the 95 % interval that SciPy 1.10.1 gives for the depression data', () => {
    const expected = reference.student_t.one_sample_t_on_depression;
    const interval = studentInterval(depression.difference);
    expect(interval.low).toBeCloseTo(expected.ci95_mean[0]!, 9);
    expect(interval.high).toBeCloseTo(expected.ci95_mean[1]!, 9);
    expect(interval.mean / interval.standardError).toBeCloseTo(expected.t, 9);
    expect(interval).toMatchObject({ method: 'student-t', n: 9, degreesOfFreedom: 8, level: 0.95 });
  });

  it('studentInterval({ level }) uses the t quantile with n − 1 degrees of freedom (SciPy 1.10.1)', () => {
    // Two values one apart: mean ½, standard error ½, so the upper bound is ½ + t/2.
    const [t90, t95, t975, t99, t995] = reference.student_t.quantiles_by_df['1'];
    const levels = [0.8, 0.9, 0.95, 0.98, 0.99];
    [t90, t95, t975, t99, t995].forEach((quantile, i) => {
      const { high } = studentInterval([0, 1], { level: levels[i]! });
      expect(Math.abs(2 * high - 1 - quantile!) / quantile!).toBeLessThan(1e-9);
    });
  });

  it('studentInterval(values) refuses a single value and NaN', () => {
    expect(() => studentInterval([1])).toThrow('values: at least 2 needed, got 1');
    expect(() => studentInterval([1, Number.NaN, 2])).toThrow('position 1 is NaN');
  });
});

describe('moments', () => {
  it('moments(equal values) has a deviation of exactly 0, whatever they sum to', () => {
    expect(moments([0.1, 0.1, 0.1])).toEqual({ n: 3, mean: 0.1, standardDeviation: 0, standardError: 0 });
  });

  it('moments(values) keeps a deviation that is too small or too large to be squared', () => {
    // By hand: half the distance, times √2.
    expect(moments([0, 2e-170]).standardDeviation! / 1e-170).toBeCloseTo(Math.SQRT2, 12);
    expect(moments([0, 2e170]).standardDeviation! / 1e170).toBeCloseTo(Math.SQRT2, 12);
  });

  it('moments(one value) has no deviation', () => {
    expect(moments([4])).toEqual({ n: 1, mean: 4 });
  });

  it('moments(values) divides by n − 1, as statsmodels 0.13.5 does', () => {
    const { x, y, mean_difference, sd_difference } = reference.equivalence;
    const { mean, standardDeviation } = moments(x.map((value, i) => value - y[i]!));
    expect(mean).toBeCloseTo(mean_difference, 12);
    expect(standardDeviation).toBeCloseTo(sd_difference, 12);
  });
});
