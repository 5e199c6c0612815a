import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { varghaDelaney } from '../../../results/statistics/vargha-delaney.js';
import reference from '../../reference/statistics.json' with { type: 'json' };

describe('varghaDelaney', () => {
  it('varghaDelaney(x, y) is the Mann-Whitney U over m · n (SciPy 1.10.1), for unequal sizes too', () => {
    for (const { x, y, A12, mannwhitney_U_x } of reference.vargha_delaney.examples) {
      const { a, nX, nY } = varghaDelaney(x, y);
      expect(a).toBeCloseTo(A12, 12);
      expect(a * nX * nY).toBeCloseTo(mannwhitney_U_x, 9);
    }
  });

  it('varghaDelaney(y, x) is 1 − A, and any rising scale gives the same', () => {
    const values = fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 1, maxLength: 12 });
    fc.assert(
      fc.property(values, values, (x, y) => {
        const forward = varghaDelaney(x, y);
        expect(varghaDelaney(y, x).a).toBeCloseTo(1 - forward.a, 12);
        expect(varghaDelaney(x.map(Math.exp), y.map(Math.exp)).a).toBe(forward.a);
      }),
    );
  });

  it('varghaDelaney(x, y) names the magnitude by the thresholds .56, .64 and .71, to both sides', () => {
    // 100 values of which `wins` lie above the one other: A = wins / 100.
    const magnitude = (wins: number) =>
      varghaDelaney(
        Array.from({ length: 100 }, (_, i) => (i < wins ? 1 : -1)),
        [0],
      ).magnitude;
    expect([50, 55, 57, 63, 65, 70, 72, 100].map(magnitude)).toEqual([
      'negligible',
      'negligible',
      'small',
      'small',
      'medium',
      'medium',
      'large',
      'large',
    ]);
    expect([45, 43, 35, 28].map(magnitude)).toEqual(['negligible', 'small', 'medium', 'large']);
  });

  it('varghaDelaney(x, y) refuses NaN by its sample and position, and an empty sample', () => {
    expect(() => varghaDelaney([1], [2, Number.NaN])).toThrow('y: position 1 is NaN');
    expect(() => varghaDelaney([], [1])).toThrow('x: at least 1 needed, got 0');
  });
});
