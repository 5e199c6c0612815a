import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { equivalenceTest } from '../../../results/statistics/equivalence.js';
import {
  equivalencePower,
  pairedPower,
  pairsForDifference,
  pairsForEquivalence,
} from '../../../results/statistics/power.js';

describe('pairedPower', () => {
  it('pairedPower(n, design) is that of the noncentral t distribution (SciPy 1.17.1, stats.nct)', () => {
    for (const [pairs, difference, expected] of [
      [2, 0.5, 0.06194860668713364],
      [2, 10, 0.7328195898057123],
      [3, 2, 0.47074943127843494],
      [16, 0.5, 0.4648699556355762],
      [16, 0.9, 0.9194739504242183],
      [34, 0.5, 0.8077775012792738],
      [5000, 0.04, 0.8072817034030897],
    ] as const)
      expect(pairedPower(pairs, { difference, standardDeviation: 1 })).toBeCloseTo(expected, 10);
    const strict = { difference: -0.02, standardDeviation: 0.013, alpha: 0.01 };
    expect(pairedPower(10, strict)).toBeCloseTo(0.9118699898169899, 10);
  });

  it('pairedPower(n, no difference) is alpha', () => {
    for (const pairs of [2, 7, 100])
      expect(pairedPower(pairs, { difference: 0, standardDeviation: 3, alpha: 0.05 })).toBeCloseTo(0.05, 9);
  });
});

describe('pairsForDifference', () => {
  it('pairsForDifference(design) is the smallest number with 80 % power (SciPy 1.17.1, stats.nct)', () => {
    // 199, 34 and 15 pairs for effects of 0.2, 0.5 and 0.8 are the usual textbook numbers.
    for (const [difference, expected] of [
      [0.1, 787],
      [0.2, 199],
      [0.5, 34],
      [0.8, 15],
      [1, 10],
      [2, 5],
      [5, 3],
    ] as const) {
      const needed = pairsForDifference({ difference, standardDeviation: 1 });
      expect(needed).toMatchObject({ method: 'noncentral-t', pairs: expected });
      expect(needed.power).toBeGreaterThanOrEqual(0.8);
      expect(pairedPower(expected - 1, { difference, standardDeviation: 1 })).toBeLessThan(0.8);
    }
  });

  it('pairsForDifference(design) depends on difference over deviation alone, whatever its sign', () => {
    const raw = pairsForDifference({ difference: -0.02, standardDeviation: 0.04 });
    expect(raw.pairs).toBe(34);
  });

  it('pairsForDifference(tiny difference) goes over to the normal approximation without a jump', () => {
    const at = (difference: number) => pairsForDifference({ difference, standardDeviation: 1 });
    const [exact, normal] = [at(0.00886), at(0.0088)];
    expect([exact.method, normal.method]).toEqual(['noncentral-t', 'normal']);
    const expected = exact.pairs * (0.00886 / 0.0088) ** 2;
    expect(Math.abs(normal.pairs / expected - 1)).toBeLessThan(1e-4);
  });

  it('pairsForDifference(design) refuses a difference of 0 and a deviation of 0', () => {
    expect(() => pairsForDifference({ difference: 0, standardDeviation: 1 })).toThrow(
      'no number of pairs finds a difference of 0',
    );
    expect(() => pairsForDifference({ difference: 1, standardDeviation: 0 })).toThrow(
      'must be above 0, got 0',
    );
    expect(() => pairsForDifference({ difference: Number.NaN, standardDeviation: 1 })).toThrow(RangeError);
  });
});

describe('equivalencePower', () => {
  it('equivalencePower(n, design) is the integral over the sample’s deviation (SciPy 1.17.1, integrate.quad)', () => {
    for (const [pairs, difference, standardDeviation, expected] of [
      [10, 0, 0.02, 0.7952072667058988],
      [16, 0.005, 0.02, 0.8870363428730994],
      [40, 0.005, 0.03, 0.92789936339067],
      [4, 0, 0.03, 0.052216651965145654],
    ] as const) {
      const power = equivalencePower(pairs, { difference, standardDeviation, margin: 0.02 });
      expect(Math.abs(power - expected)).toBeLessThan(1e-5);
    }
  });

  it('equivalencePower(n, design) is how often equivalenceTest says yes', () => {
    const draws = rootStream(1);
    let found = 0;
    for (let sample = 0; sample < 1000; sample++) {
      const differences = Array.from({ length: 12 }, () => 0.2 + draws.normal());
      if (equivalenceTest(differences, { margin: 1 }).equivalent) found++;
    }
    const power = equivalencePower(12, { difference: 0.2, standardDeviation: 1, margin: 1 });
    expect(Math.abs(found / 1000 - power)).toBeLessThan(3.5 * Math.sqrt((power * (1 - power)) / 1000));
  });
});

describe('pairsForEquivalence', () => {
  it('pairsForEquivalence(design) is the smallest number with 80 % power', () => {
    for (const [difference, standardDeviation, expected] of [
      [0, 0.02, 11],
      [-0.005, 0.02, 13],
      [0.01, 0.03, 58],
    ] as const) {
      const design = { difference, standardDeviation, margin: 0.02 };
      expect(pairsForEquivalence(design).pairs).toBe(expected); // SciPy 1.17.1, integrate.quad
      expect(equivalencePower(expected - 1, design)).toBeLessThan(0.8);
    }
  });

  it('pairsForEquivalence(design) refuses a difference at the margin', () => {
    expect(() => pairsForEquivalence({ difference: 0.02, standardDeviation: 1, margin: 0.02 })).toThrow(
      'no number of pairs shows 0.02 to lie within ±0.02',
    );
  });
});
