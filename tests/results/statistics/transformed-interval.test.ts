import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { moments } from '../../../results/statistics/moments.js';
import { studentInterval } from '../../../results/statistics/student-interval.js';
import { transformedInterval } from '../../../results/statistics/transformed-interval.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const skewed = [0.91, 0.94, 0.97, 0.98, 0.99, 0.99, 1, 0.95, 0.62, 0.98];

/** Hall's statistic g(T) for a mean μ, straight from Hall 1992: T + γT²/(3√n) + γ²T³/(27n) + γ/(6√n). */
function hall(values: readonly number[], mu: number): number {
  const n = values.length;
  const { mean, standardError } = moments(values);
  const centred = (power: number) => values.reduce((sum, value) => sum + (value - mean) ** power, 0) / n;
  const gamma = centred(3) / centred(2) ** 1.5;
  const T = (mean - mu) / standardError!;
  return (
    T + (gamma * T ** 2) / (3 * Math.sqrt(n)) + (gamma ** 2 * T ** 3) / (27 * n) + gamma / (6 * Math.sqrt(n))
  );
}

describe('transformedInterval', () => {
  it("transformedInterval(values) has its bounds where Hall's statistic equals ±t(0.975, 9) (SciPy 1.10.1)", () => {
    const t = reference.student_t.quantiles_by_df['9'][2]!;
    const { low, high, degreesOfFreedom } = transformedInterval(skewed);
    expect(degreesOfFreedom).toBe(9);
    expect(hall(skewed, low)).toBeCloseTo(t, 8);
    expect(hall(skewed, high)).toBeCloseTo(-t, 8);
  });

  it("transformedInterval(symmetric values) is Student's", () => {
    const values = [-5, -2, -1, -1, 1, 1, 2, 5];
    const { low, high, skewness } = transformedInterval(values);
    expect(skewness).toBeCloseTo(0, 12);
    expect(low).toBeCloseTo(studentInterval(values).low, 9);
    expect(high).toBeCloseTo(studentInterval(values).high, 9);
  });

  it('transformedInterval(values) has no jump where the skewness passes zero', () => {
    const bent = (by: number) => transformedInterval([-5, -2, -1, -1, 1, 1, 2, 5 + by]);
    for (const by of [1e-4, 1e-5, 1e-6]) {
      expect(Math.abs(bent(by).low - bent(0).low)).toBeLessThan(3 * by);
      expect(Math.abs(bent(by).high - bent(-by).high)).toBeLessThan(6 * by);
    }
  });

  it('transformedInterval(values) reaches further on the side of the long tail', () => {
    const { low, mean, high } = transformedInterval(skewed);
    expect(mean - low).toBeGreaterThan(1.5 * (high - mean));
  });

  it('transformedInterval(values) mirrors with its values, and widens with the level', () => {
    const values = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 2, maxLength: 20 });
    fc.assert(
      fc.property(values, (some) => {
        const [one, other] = [transformedInterval(some), transformedInterval(some.map((value) => -value))];
        expect(one.low).toBeCloseTo(-other.high, 8);
        const wide = transformedInterval(some, { level: 0.99 });
        expect(wide.low).toBeLessThanOrEqual(one.low + 1e-9);
        expect(wide.high).toBeGreaterThanOrEqual(one.high - 1e-9);
      }),
      { numRuns: 60 },
    );
  });

  it('transformedInterval(normal values) at 90 % covers the mean in 90 % of samples', () => {
    const draws = rootStream(4);
    let covered = 0;
    for (let sample = 0; sample < 2000; sample++) {
      const { low, high } = transformedInterval(
        Array.from({ length: 32 }, () => draws.normal()),
        { level: 0.9 },
      );
      if (low <= 0 && high >= 0) covered++;
    }
    expect(Math.abs(covered / 2000 - 0.9)).toBeLessThan(3.5 * Math.sqrt((0.9 * 0.1) / 2000));
  });

  it('transformedInterval(values) refuses a single value, NaN and a level outside (0, 1)', () => {
    expect(() => transformedInterval([1])).toThrow('values: at least 2 needed, got 1');
    expect(() => transformedInterval([1, Number.NaN])).toThrow('position 1 is NaN');
    expect(() => transformedInterval([1, 2], { level: 1 })).toThrow('level must lie between 0 and 1');
  });
});
