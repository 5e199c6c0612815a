import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { holmAdjust } from '../../../results/statistics/holm.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const shares = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 12 });

describe('holmAdjust', () => {
  it('holmAdjust(p) gives what statsmodels 0.13.5 and R 4.2.2 give', () => {
    for (const { p, holm } of reference.multiple_comparison.examples)
      holmAdjust(p).forEach((adjusted, i) => {
        expect(adjusted).toBeCloseTo(holm[i]!, 12);
      });
  });

  it('holmAdjust(p) reproduces the comparison with a control of Demšar 2006', () => {
    const computed = reference.demsar_2006.computed_from_published_ranks;
    holmAdjust(computed.p_two_sided).forEach((adjusted, i) => {
      expect(adjusted).toBeCloseTo(computed['holm_adjusted_p'][i]!, 12);
    });
  });

  it('holmAdjust(p) keeps the order of p, and lies between p and Bonferroni’s m · p', () => {
    fc.assert(
      fc.property(shares, (p) => {
        const adjusted = holmAdjust(p);
        p.forEach((value, i) => {
          expect(adjusted[i]!).toBeGreaterThanOrEqual(value);
          expect(adjusted[i]!).toBeLessThanOrEqual(Math.min(1, p.length * value) + 1e-15);
          p.forEach((other, j) => {
            if (value < other) expect(adjusted[i]!).toBeLessThanOrEqual(adjusted[j]!);
            if (value === other) expect(adjusted[i]!).toBe(adjusted[j]!);
          });
        });
      }),
    );
  });

  it('holmAdjust(p) never falls when a p-value rises', () => {
    fc.assert(
      fc.property(shares, fc.nat(), fc.double({ min: 0, max: 1, noNaN: true }), (p, at, raise) => {
        fc.pre(p.length > 0);
        const raised = p.map((value, i) => (i === at % p.length ? value + (1 - value) * raise : value));
        const [before, after] = [holmAdjust(p), holmAdjust(raised)];
        before.forEach((value, i) => {
          expect(after[i]!).toBeGreaterThanOrEqual(value);
        });
      }),
    );
  });

  it('holmAdjust(p) takes none, leaves one as it is, and refuses NaN with its position', () => {
    expect(holmAdjust([])).toEqual([]);
    expect(holmAdjust([0.03])).toEqual([0.03]);
    expect(() => holmAdjust([0.1, Number.NaN])).toThrow('p-values: position 1 is NaN');
    expect(() => holmAdjust([1.1])).toThrow(RangeError);
  });
});
