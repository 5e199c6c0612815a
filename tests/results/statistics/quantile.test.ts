import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { median, quantile, quantileSorted } from '../../../results/statistics/quantile.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

// NumPy 1.24.2 and R 4.2.2, definition 7 of Hyndman & Fan 1996.
const { x, p, types, type7_more: more } = reference.quantiles;

describe('quantile', () => {
  it('quantile(values, p) is definition 7 and no other', () => {
    p.forEach((share, i) => {
      expect(quantile(x, share)).toBeCloseTo(types['7'][i]!, 12);
    });
    for (const other of ['4', '5', '6', '8', '9'] as const)
      expect(quantile(x, 0.25)).not.toBeCloseTo(types[other][3]!, 6);
  });

  it('quantile(values, p) takes values in any order and leaves them as they are', () => {
    for (const example of more) {
      const kept = [...example.x];
      example.p.forEach((share, i) => {
        expect(quantile(example.x, share)).toBeCloseTo(example.q[i]!, 12);
      });
      expect(example.x).toEqual(kept);
    }
  });

  it('quantile(values, 0) is the minimum, quantile(values, 1) the maximum, median(values) the middle', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.double({ min: -1e6, max: 1e6, noNaN: true }).filter((value) => !Object.is(value, -0)),
          { minLength: 1, maxLength: 20 },
        ),
        (values) => {
          expect(quantile(values, 0)).toBe(Math.min(...values));
          expect(quantile(values, 1)).toBe(Math.max(...values));
          const below = values.filter((value) => value < median(values)).length;
          const above = values.filter((value) => value > median(values)).length;
          expect(Math.max(below, above)).toBeLessThanOrEqual(values.length / 2);
        },
      ),
    );
  });

  it('quantile(values, p) refuses NaN with its position, no values, and p outside 0 to 1', () => {
    expect(() => quantile([1, 2, Number.NaN], 0.5)).toThrow(
      new RangeError('values: position 2 is NaN, not a finite number'),
    );
    expect(() => quantile([], 0.5)).toThrow(RangeError);
    expect(() => quantileSorted([], 0.5)).toThrow(RangeError);
    expect(() => quantile([1], 1.01)).toThrow(RangeError);
    expect(() => quantile([1], Number.NaN)).toThrow(RangeError);
  });
});
