import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { type Alternative, signFlipTest } from '../../../results/statistics/sign-flip.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

function test(differences: ArrayLike<number>, alternative: Alternative = 'two-sided') {
  return signFlipTest(differences, { alternative, stream: rootStream(1) });
}

describe('signFlipTest', () => {
  it('signFlipTest(Darwin’s maize) counts 863 of 32768 patterns, as Fisher 1935 did', () => {
    const darwin = reference.paired_permutation_exact.fisher_darwin;
    const greater = test(darwin.difference, 'greater');
    expect(greater).toMatchObject({ method: 'sign-flip-exact', patterns: 32768, n: 15 });
    expect(greater.p * 32768).toBe(darwin.count_sum_greater + darwin.count_sum_equal);
    expect(test(darwin.difference).p).toBe(darwin.p_two_sided);
    expect(greater.meanDifference).toBeCloseTo(darwin.statistic_mean, 12);
  });

  it('signFlipTest(differences) is exact for decimal differences and by hand (SciPy 1.10.1)', () => {
    const { hollander_wolfe_depression: depression, tiny_by_hand: tiny } = reference.paired_permutation_exact;
    for (const example of [depression, tiny]) {
      expect(test(example.difference, 'greater').p).toBe(example.p_greater);
      expect(test(example.difference).p).toBe(example.p_two_sided);
    }
  });

  it('signFlipTest(differences) counts ties by value and not by rounding of sums', () => {
    // Sums of tenths differ in their last bits with the signs; sums of whole numbers don't.
    const whole = fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 1, maxLength: 10 });
    fc.assert(
      fc.property(whole, fc.constantFrom('two-sided', 'greater', 'less'), (values, alternative) => {
        const tenths = values.map((value) => value * 0.1);
        expect(test(tenths, alternative).p).toBe(test(values, alternative).p);
      }),
    );
  });

  it('signFlipTest(differences) is symmetric, ignores order, and has p in (0, 1]', () => {
    const values = fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: 1, maxLength: 9 });
    fc.assert(
      fc.property(values, (sample) => {
        const mirrored = sample.map((value) => -value);
        expect(test(mirrored).p).toBe(test(sample).p);
        expect(test(mirrored, 'less').p).toBe(test(sample, 'greater').p);
        expect(test(sample.toReversed()).p).toBe(test(sample).p);
        expect(test(sample.map((value) => 8 * value)).p).toBe(test(sample).p);
        expect(test(sample).p).toBeGreaterThanOrEqual(2 ** -sample.length);
        expect(test(sample).p).toBeLessThanOrEqual(1);
      }),
    );
  });

  it('signFlipTest(differences) keeps zeros, which change nothing', () => {
    const { difference } = reference.paired_permutation_exact.tiny_by_hand;
    const padded = test([0, ...difference, 0, 0]);
    expect(padded.n).toBe(7);
    expect(padded.p).toBe(test(difference).p);
    expect(test([0, 0, 0]).p).toBe(1);
  });

  it('signFlipTest(16 differences) is exact, signFlipTest(17 differences) drawn', () => {
    const equal = (n: number) => test(new Float64Array(n).fill(1));
    expect(equal(16)).toMatchObject({ method: 'sign-flip-exact', patterns: 65536, p: 2 / 65536 });
    // None of 20,000 drawn patterns reaches a chance of 2/131072, or hardly one.
    const drawn = equal(17);
    expect(drawn).toMatchObject({ method: 'sign-flip-drawn', flips: 20_000 });
    expect(drawn.p).toBeGreaterThanOrEqual(1 / 20_001);
    expect(drawn.p).toBeLessThan(5 / 20_001);
  });

  it('signFlipTest(20 differences) lies within its own Monte-Carlo error of full enumeration (NumPy)', () => {
    const differences = Array.from({ length: 20 }, (_, i) => ((i * 7) % 11) - 3.5);
    const exact = { 'two-sided': 0.08122825622558594, greater: 0.04061412811279297 };
    for (const alternative of ['two-sided', 'greater'] as const) {
      const result = test(differences, alternative);
      if (result.method !== 'sign-flip-drawn') throw new Error('20 pairs are not enumerated');
      expect(result.monteCarloStandardError).toBeCloseTo(Math.sqrt((result.p * (1 - result.p)) / 20_000), 12);
      expect(Math.abs(result.p - exact[alternative])).toBeLessThan(4 * result.monteCarloStandardError);
      expect(test(differences, alternative)).toEqual(result);
    }
  });

  it('signFlipTest(70 differences) flips every sign in half of the draws, the 33rd and 65th too', () => {
    // One nonzero difference decides the sum: it keeps its sign in half of the patterns.
    for (const at of [0, 31, 32, 63, 64, 69]) {
      const differences = Array.from({ length: 70 }, (_, i) => (i === at ? 1 : 0));
      expect(Math.abs(test(differences, 'greater').p - 0.5)).toBeLessThan(4 * Math.sqrt(0.25 / 20_000));
    }
    // Two equal ones both keep their sign in a quarter, wherever they stand.
    for (const [first, second] of [
      [0, 32],
      [31, 32],
      [5, 69],
    ] as const) {
      const differences = Array.from({ length: 70 }, (_, i) => (i === first || i === second ? 1 : 0));
      expect(Math.abs(test(differences, 'greater').p - 0.25)).toBeLessThan(4 * Math.sqrt(0.1875 / 20_000));
    }
  });

  it('signFlipTest(no difference in truth) rejects at 5 % in 5 % of samples', () => {
    const draws = rootStream(4);
    let rejected = 0;
    for (let sample = 0; sample < 1000; sample++) {
      const differences = Array.from({ length: 9 }, () => draws.normal());
      if (test(differences).p <= 0.0546875) rejected++; // 28 of 512 patterns
    }
    const standardError = Math.sqrt((0.0546875 * (1 - 0.0546875)) / 1000);
    expect(Math.abs(rejected / 1000 - 0.0546875)).toBeLessThan(3.5 * standardError);
  });

  it('signFlipTest(differences) refuses NaN with its position, and no differences', () => {
    expect(() => test([1, 2, Number.NaN])).toThrow('differences: position 2 is NaN, not a finite number');
    expect(() => test([])).toThrow(RangeError);
  });
});
