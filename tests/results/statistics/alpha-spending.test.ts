import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { spendingBounds, spentAlpha } from '../../../results/statistics/alpha-spending.js';

describe('spentAlpha(information, alpha)', () => {
  test('is the O’Brien-Fleming type function of Lan & DeMets 1983', () => {
    // 2 (1 − Φ(2.2414 / √0.5)) with Φ⁻¹(1 − 0.0125) = 2.241403, by scipy 1.17.1 stats.norm
    expect(spentAlpha(0.5, 0.025)).toBeCloseTo(0.0015253, 6);
  });

  test('spends all at the end, and never less with more information', () => {
    const shares = Array.from({ length: 50 }, (_, i) => spentAlpha((i + 1) / 50, 0.05));
    expect(shares.at(-1)).toBe(0.05);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
  });

  test('refuses information outside (0, 1]', () => {
    expect(() => spentAlpha(0, 0.05)).toThrow(RangeError);
    expect(() => spentAlpha(1.1, 0.05)).toThrow(RangeError);
  });
});

describe('spendingBounds(information, alpha)', () => {
  test('are the published bounds of five equal looks at one-sided .025', () => {
    // From memory: the table for five equally spaced looks in the literature on the Lan-DeMets procedure
    // (4.877, 3.357, 2.680, 2.290, 2.031); held here to the three digits remembered.
    const bounds = spendingBounds([0.2, 0.4, 0.6, 0.8, 1], 0.025);
    [4.877, 3.357, 2.68, 2.29, 2.031].forEach((published, i) => {
      expect(Math.abs(bounds[i]! - published)).toBeLessThan(6e-4);
    });
  });

  test('with one look at all data, are the ordinary critical value', () => {
    expect(spendingBounds([1], 0.025)[0]).toBeCloseTo(1.959964, 5);
  });

  test('two looks: the second bound leaves what bivariate normal integration leaves', () => {
    // P(Z1 > 2.96259 or Z2 > 1.96869) with correlation √.5 is .025 by scipy 1.17.1 multivariate_normal.cdf
    const [first, second] = spendingBounds([0.5, 1], 0.025);
    expect(first).toBeCloseTo(2.96259, 4);
    expect(Math.abs(second! - 1.96869)).toBeLessThan(5e-4);
  });

  test('are passed by a simulated random walk at most at the level, at unequal looks', () => {
    const information = [0.15, 0.2, 0.5, 0.55, 1];
    const bounds = spendingBounds(information, 0.05);
    const stream = rootStream(7);
    const walks = 40_000;
    let passed = 0;
    for (let walk = 0; walk < walks; walk++) {
      let position = 0;
      let time = 0;
      const crosses = information.some((share, look) => {
        position += stream.normal() * Math.sqrt(share - time);
        time = share;
        return position / Math.sqrt(share) > bounds[look]!;
      });
      passed += Number(crosses);
    }
    // Four Monte-Carlo standard errors: false alarm below 1e-4.
    expect(Math.abs(passed / walks - 0.05)).toBeLessThan(4 * Math.sqrt((0.05 * 0.95) / walks));
  });

  test('refuses looks that do not rise', () => {
    expect(() => spendingBounds([0.5, 0.5], 0.05)).toThrow(RangeError);
    expect(() => spendingBounds([], 0.05)).toThrow(RangeError);
  });
});
