import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { wilsonInterval } from '../../../results/statistics/wilson.js';

describe('wilsonInterval', () => {
  it('wilsonInterval({ successes, trials }) is SciPy’s', () => {
    // SciPy 1.17.1, binomtest(successes, trials).proportion_ci(0.95, 'wilson').
    for (const [successes, trials, low, high] of [
      [0, 10, 0, 0.27753279986288926],
      [3, 10, 0.10779126740630102, 0.6032218525388546],
      [10, 10, 0.7224672001371109, 1],
      [81, 263, 0.2552885198782742, 0.36620957698280004],
      [1, 29, 0.006113214292762667, 0.17175521879320282],
    ] as const) {
      const interval = wilsonInterval({ successes, trials });
      expect(interval.low).toBeCloseTo(low, 10);
      expect(interval.high).toBeCloseTo(high, 10);
    }
  });

  it('wilsonInterval({ successes, trials }) stays within 0 to 1, holds the share and mirrors', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 500 }), fc.nat(), (trials, draw) => {
        const successes = draw % (trials + 1);
        const { low, high, share } = wilsonInterval({ successes, trials });
        expect(low).toBeGreaterThanOrEqual(0);
        expect(high).toBeLessThanOrEqual(1);
        expect(low).toBeLessThanOrEqual(share);
        expect(high).toBeGreaterThanOrEqual(share);
        expect(high).toBeGreaterThan(low);
        expect(wilsonInterval({ successes: trials - successes, trials }).low).toBeCloseTo(1 - high, 12);
      }),
    );
  });

  it('wilsonInterval({ successes, trials }) refuses no trials, and more successes than trials', () => {
    expect(() => wilsonInterval({ successes: 0, trials: 0 })).toThrow('trials must be a whole number');
    expect(() => wilsonInterval({ successes: 3, trials: 2 })).toThrow('3 successes in 2 trials');
    expect(() => wilsonInterval({ successes: Number.NaN, trials: 2 })).toThrow(RangeError);
  });
});
