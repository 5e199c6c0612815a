import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  interquartileMean,
  interquartileMeanSorted,
} from '../../../results/statistics/interquartile-mean.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

const values = fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 1, maxLength: 30 });

describe('interquartileMean', () => {
  it('interquartileMean(values) cuts a quarter of the values with fractional weights (NumPy 1.24.2)', () => {
    for (const example of reference.trimmed_means.examples)
      expect(interquartileMean(example.x)).toBeCloseTo(example.iqm_fractional_weights, 12);
  });

  it('interquartileMean(4k values) is the 25 % trimmed mean (SciPy 1.10.1)', () => {
    const example = reference.trimmed_means.examples[0]!;
    expect(example.x.length % 4).toBe(0);
    expect(interquartileMean(example.x)).toBeCloseTo(example['trim_mean_0.25'], 12);
  });

  it('interquartileMean(5 values) keeps ¾ of the second and fourth', () => {
    // By hand: (0.75 · 2 + 4 + 0.75 · 10) / 2.5.
    expect(interquartileMean([4, -99, 10, 1e6, 2])).toBeCloseTo(13 / 2.5, 12);
  });

  it('interquartileMean(values) of one value is the value, of two or three something between them', () => {
    expect(interquartileMean([7])).toBe(7);
    expect(interquartileMean([2, 4])).toBe(3);
    expect(interquartileMean([0, 3, 9])).toBeCloseTo((0.25 * 0 + 3 + 0.25 * 9) / 1.5, 12);
  });

  it('interquartileMean(values) ignores order, and how far out the outer quarters lie', () => {
    fc.assert(
      fc.property(values, (sample) => {
        const sorted = [...sample].sort((a, b) => a - b);
        expect(interquartileMean(sorted)).toBe(interquartileMean(sample));
        const quarter = Math.floor(sample.length / 4);
        const stretched = sorted.map((value, i) => (i < quarter ? value - 1e3 : value));
        expect(interquartileMean(stretched)).toBeCloseTo(interquartileMean(sample), 9);
      }),
    );
  });

  it('interquartileMeanSorted(sorted, places, counts, total) is interquartileMean of the values written out', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: -50, max: 50 }), fc.nat(3)), { minLength: 1 }),
        (pairs) => {
          pairs.sort((a, b) => a[0] - b[0]);
          const written = pairs.flatMap(([value, count]) => new Array<number>(count).fill(value));
          fc.pre(written.length > 0);
          const counted = interquartileMeanSorted(
            Float64Array.from(pairs, ([value]) => value),
            Uint32Array.from(pairs, (_, i) => pairs.length - 1 - i),
            Uint32Array.from(pairs, ([, count]) => count).reverse(),
            written.length,
          );
          expect(counted).toBeCloseTo(interquartileMean(written), 10);
        },
      ),
    );
  });

  it('interquartileMean(values) refuses NaN and no values', () => {
    expect(() => interquartileMean([0, Number.NaN])).toThrow('position 1 is NaN');
    expect(() => interquartileMean([])).toThrow(RangeError);
  });
});
