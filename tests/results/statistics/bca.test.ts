import { sampleCorrelation } from 'simple-statistics';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { bcaInterval, bcaMeanInterval } from '../../../results/statistics/bca.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const { law_school: lawSchool, cd4 } = reference.bca_bootstrap;

function correlation(a: readonly number[], b: readonly number[]): (rows: Uint32Array) => number {
  return (rows) =>
    sampleCorrelation(
      Array.from(rows, (i) => a[i]!),
      Array.from(rows, (i) => b[i]!),
    );
}

const lawSchoolAt = (level: number) =>
  bcaInterval(15, correlation(lawSchool.LSAT, lawSchool.GPA), { level, stream: rootStream(1) });

describe('bcaInterval', () => {
  it('bcaInterval(correlation) of the law school data has the jackknife acceleration of Efron & Tibshirani 1993', () => {
    const interval = lawSchoolAt(0.9);
    expect(interval.estimate).toBeCloseTo(lawSchool.theta_hat, 9);
    expect(interval.acceleration).toBeCloseTo(lawSchool.acceleration_jackknife, 9);
    expect(interval.biasCorrection).toBeCloseTo(lawSchool.z0_monte_carlo, 1);
    expect(Math.abs(interval.standardError - lawSchool.bootstrap_se_monte_carlo)).toBeLessThan(0.005);
  });

  it('bcaInterval(correlation) of the law school data agrees with SciPy 1.10.1 at 90 and 95 %', () => {
    for (const [level, key] of [
      [0.9, 'level_0.90'],
      [0.95, 'level_0.95'],
    ] as const) {
      const { low, high } = lawSchoolAt(level);
      // Five standard deviations of an endpoint at 9999 resamples are about 0.03 (low) and 0.007 (high).
      expect(Math.abs(low - lawSchool[key].BCa[0]!)).toBeLessThan(0.03);
      expect(Math.abs(high - lawSchool[key].BCa[1]!)).toBeLessThan(0.007);
      expect(Math.abs(low - lawSchool[key].percentile[0]!)).toBeGreaterThan(0.06);
    }
  });

  it('bcaInterval(correlation) of the cd4 data is that of DiCiccio & Efron 1996 at 90 %', () => {
    const interval = bcaInterval(20, correlation(cd4.baseline, cd4.one_year), {
      level: 0.9,
      stream: rootStream(2),
    });
    expect(interval.acceleration).toBeCloseTo(cd4.acceleration_jackknife, 9);
    expect(Math.abs(interval.low - cd4['level_0.90'].BCa[0]!)).toBeLessThan(0.02);
    expect(Math.abs(interval.high - cd4['level_0.90'].BCa[1]!)).toBeLessThan(0.01);
    expect(Math.abs(interval.low - cd4.published.BCa_90_nonparametric[0]!)).toBeLessThan(0.03);
    expect(Math.abs(interval.high - cd4.published.BCa_90_nonparametric[1]!)).toBeLessThan(0.02);
  });

  it('bcaInterval(n, statistic) counts a replicate equal to the estimate half', () => {
    // The maximum of two values is drawn in 3 of 4 resamples and then equals the estimate: share ¼ + ½ · ¾ = 0.625.
    const interval = bcaInterval(2, (rows) => Math.max(...rows), {
      resamples: 40_000,
      stream: rootStream(3),
    });
    expect(Math.abs(interval.biasCorrection - 0.3186)).toBeLessThan(0.03); // Φ⁻¹(0.625), SciPy 1.17.1
  });

  it('bcaInterval(n, statistic) refuses a resample without a finite statistic', () => {
    // Drawn twice, the same row leaves nothing to divide by: 0 / 0.
    const slope = (rows: Uint32Array) => (rows[0]! - rows[1]!) / (rows[0]! - rows[1]!);
    const noVariance = () =>
      bcaInterval(2, (rows) => (rows.length < 2 ? 1 : slope(rows)), { stream: rootStream(4) });
    expect(noVariance).toThrow(/^statistic of the resamples: position \d+ is NaN/);
  });
});

describe('bcaMeanInterval', () => {
  const values = [3.1, 0.2, 0.7, 1.4, 9.6, 2.2, 0.1, 5.3, 1.9, 0.4];

  it('bcaMeanInterval(values) is bcaInterval of their mean, with the same stream', () => {
    const fast = bcaMeanInterval(values, { stream: rootStream(5) });
    const mean = (rows: Uint32Array) => rows.reduce((sum, i) => sum + values[i]!, 0) / rows.length;
    const general = bcaInterval(values.length, mean, { stream: rootStream(5) });
    for (const key of ['estimate', 'low', 'high', 'biasCorrection', 'acceleration', 'standardError'] as const)
      expect(fast[key]).toBeCloseTo(general[key], 10);
  });

  it('bcaMeanInterval(values) reaches further on the side of the long tail', () => {
    const { low, high, estimate, acceleration } = bcaMeanInterval(values, { stream: rootStream(6) });
    expect(acceleration).toBeGreaterThan(0);
    expect(high - estimate).toBeGreaterThan(1.2 * (estimate - low));
  });

  it('bcaMeanInterval(values) counts ties by value and not by rounding of sums', () => {
    // Sums of tenths differ in their last bits with the order of drawing; whole numbers don't.
    const tenths = [0.1, 0.2, 0.3, 0.1, 0.7, 0.2, 0.6, 0.1];
    const whole = tenths.map((value) => Math.round(10 * value));
    const a = bcaMeanInterval(tenths, { stream: rootStream(7) });
    const b = bcaMeanInterval(whole, { stream: rootStream(7) });
    expect(a.biasCorrection).toBe(b.biasCorrection);
  });
});
