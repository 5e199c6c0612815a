import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { equivalenceTest } from '../../../results/statistics/equivalence.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const { x, y, margin, paired_tost: expected, paired_ci90: interval } = reference.equivalence;
const differences = x.map((value, i) => value - y[i]!);

describe('equivalenceTest', () => {
  it('equivalenceTest(differences) gives the two t tests of statsmodels 0.13.5', () => {
    const result = equivalenceTest(differences, { margin });
    expect(result.lower.t).toBeCloseTo(expected.lower.t, 9);
    expect(result.upper.t).toBeCloseTo(expected.upper.t, 9);
    expect(result.lower.p / expected.lower.p).toBeCloseTo(1, 8);
    expect(result.upper.p / expected.upper.p).toBeCloseTo(1, 8);
    expect(result.p).toBe(result.upper.p);
    expect(result.low).toBeCloseTo(interval[0]!, 9);
    expect(result.high).toBeCloseTo(interval[1]!, 9);
    expect(result).toMatchObject({ n: 10, degreesOfFreedom: 9, equivalent: true, level: 0.9 });
  });

  it('equivalenceTest(differences) finds them equivalent exactly when the 1 − 2α interval lies within ±margin', () => {
    const values = fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 2, maxLength: 12 });
    const margins = fc.double({ min: 0.05, max: 2, noNaN: true });
    const alphas = fc.constantFrom(0.01, 0.05, 0.2);
    fc.assert(
      fc.property(values, margins, alphas, (sample, bound, alpha) => {
        const { equivalent, low, high, p } = equivalenceTest(sample, { margin: bound, alpha });
        fc.pre(Math.abs(p - alpha) > 1e-6);
        expect(equivalent).toBe(low > -bound && high < bound);
      }),
    );
  });

  it('equivalenceTest(−differences) swaps the two tests', () => {
    const result = equivalenceTest(differences, { margin });
    const mirrored = equivalenceTest(
      differences.map((value) => -value),
      { margin },
    );
    expect(mirrored.lower.p).toBeCloseTo(result.upper.p, 12);
    expect(mirrored.upper.t).toBeCloseTo(-result.lower.t, 9);
  });

  it('equivalenceTest(equal differences) says that they are constant, and compares them with the margin', () => {
    const at = (value: number) => equivalenceTest([value, value, value], { margin: 0.5 });
    expect(at(0)).toMatchObject({ method: 'constant', p: 0, equivalent: true, low: 0, high: 0 });
    expect(at(0.5)).toMatchObject({ method: 'constant', p: 1, equivalent: false });
    expect(at(-0.7)).toMatchObject({ method: 'constant', p: 1, equivalent: false });
  });

  it('equivalenceTest(differences) refuses NaN, a single difference, and a margin of 0', () => {
    expect(() => equivalenceTest([0, Number.NaN], { margin })).toThrow('differences: position 1 is NaN');
    expect(() => equivalenceTest([0], { margin })).toThrow('at least 2 needed, got 1');
    expect(() => equivalenceTest([0, 1], { margin: 0 })).toThrow('margin must be above 0, got 0');
    expect(() => equivalenceTest([0, 1], { margin, alpha: 0.5 })).toThrow(RangeError);
  });
});
