import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { wilcoxonTest } from '../../../results/statistics/wilcoxon.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const { wilcoxon_signed_rank: examples } = reference;

/** Differences of sizes 1 … n, of which the negative ones sum to `total`. */
function withNegativeRanks(n: number, total: number): number[] {
  let left = total;
  return Array.from({ length: n }, (_, i) => n - i).map((size) => {
    if (size > left) return size;
    left -= size;
    return -size;
  });
}

describe('wilcoxonTest', () => {
  it('wilcoxonTest(depression data) is that of Hollander & Wolfe, example 3.1', () => {
    const example = examples.hollander_wolfe_depression;
    const greater = wilcoxonTest(example.difference, { alternative: 'greater' });
    expect(greater.positiveRanks).toBe(example.published.V);
    expect(greater.p).toBeCloseTo(example.p_greater_exact, 12);
    expect(greater).toMatchObject({ method: 'wilcoxon-exact', n: 9, zeros: 0, negativeRanks: 5 });
    expect(wilcoxonTest(example.difference).p).toBeCloseTo(example.p_two_sided_exact, 12);
  });

  it('wilcoxonTest(Darwin’s maize) is exact, 96 against 24 (SciPy 1.10.1)', () => {
    const example = examples.wilcoxon_1945_darwin_maize;
    const result = wilcoxonTest(example.difference);
    expect([result.positiveRanks, result.negativeRanks]).toEqual([example.W_plus, example.W_minus]);
    expect(result.p).toBeCloseTo(example.p_two_sided_exact, 12);
  });

  it('wilcoxonTest({ zeros }) splits zeros as Demšar 2006, table 2, or drops them, with ties exact', () => {
    const example = examples.demsar_2006_table2;
    const split = wilcoxonTest(example.difference);
    expect([split.positiveRanks, split.negativeRanks]).toEqual([
      example.published.R_plus,
      example.published.R_minus,
    ]);
    expect(split).toMatchObject({ n: 14, zeros: 2 });
    expect(split.p).toBeCloseTo(32 / 4096, 12); // all 2^12 sign patterns, NumPy
    const dropped = wilcoxonTest(example.difference, { zeros: 'drop' });
    expect(dropped.positiveRanks).toBe(example.computed.drop_zeros_W_plus);
    expect(dropped.p).toBeCloseTo(example.computed.drop_zeros_exact_permutation_p_two_sided_midrank_ties, 12);
  });

  it('wilcoxonTest(n differences) has the critical values of the printed tables', () => {
    for (const [alpha, key] of [
      [0.05, 'alpha_0.05'],
      [0.1, 'alpha_0.10'],
    ] as const) {
      for (const [n, critical] of Object.entries(examples.two_sided_critical_T[key])) {
        const pAt = (total: number) => wilcoxonTest(withNegativeRanks(Number(n), total)).p;
        expect(pAt(critical)).toBeLessThanOrEqual(alpha);
        expect(pAt(critical + 1)).toBeGreaterThan(alpha);
      }
    }
  });

  it('wilcoxonTest(5 differences) follows the counts of all 32 sign patterns', () => {
    let tail = 0;
    examples.null_counts_n5.forEach((count, total) => {
      tail += count;
      const { p } = wilcoxonTest(withNegativeRanks(5, total), { alternative: 'greater' });
      expect(p).toBeCloseTo(tail / 32, 12);
    });
  });

  it('wilcoxonTest(60 differences) takes the normal approximation (SciPy 1.17.1)', () => {
    // wilcoxon(x, zero_method='pratt' and 'wilcox', correction=False, method='approx'), with ties and one zero.
    const differences = Array.from({ length: 60 }, (_, i) => (((i + 1) * 37) % 61) - 25);
    const split = wilcoxonTest(differences);
    expect(split).toMatchObject({ method: 'wilcoxon-normal', zeros: 1, n: 60 });
    expect(split.p).toBeCloseTo(0.02594185797446596, 9);
    expect(wilcoxonTest(differences, { alternative: 'greater' }).p).toBeCloseTo(0.01297092898723298, 9);
    expect(wilcoxonTest(differences, { zeros: 'drop' }).p).toBeCloseTo(0.024965220366753117, 9);
  });

  it('wilcoxonTest(−differences) swaps the sides, and ranks add up to n(n + 1)/2', () => {
    const values = fc.array(fc.integer({ min: -8, max: 8 }), { minLength: 1, maxLength: 20 });
    fc.assert(
      fc.property(values, (sample) => {
        const mirrored = sample.map((value) => -value);
        expect(wilcoxonTest(mirrored).p).toBe(wilcoxonTest(sample).p);
        const greater = wilcoxonTest(sample, { alternative: 'greater' });
        expect(wilcoxonTest(mirrored, { alternative: 'less' }).p).toBe(greater.p);
        const n = sample.length;
        expect(greater.positiveRanks + greater.negativeRanks).toBeCloseTo((n * (n + 1)) / 2, 9);
        expect(greater.p).toBeGreaterThan(0);
        expect(greater.p).toBeLessThanOrEqual(1);
      }),
    );
  });

  it('wilcoxonTest(all zero) has p = 1, and NaN is refused with its position', () => {
    for (const zeros of ['split', 'drop'] as const) expect(wilcoxonTest([0, 0], { zeros }).p).toBe(1);
    expect(() => wilcoxonTest([1, Number.NaN])).toThrow('differences: position 1 is NaN');
  });
});
