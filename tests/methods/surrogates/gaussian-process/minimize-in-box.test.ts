import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { minimizeInBox } from '../../../../methods/surrogates/gaussian-process/minimize-in-box.js';

/** Rosenbrock 1960: 100 (y − x²)² + (1 − x)², smallest, 0, at (1, 1). */
function rosenbrock(point: Float64Array) {
  const [x, y] = point as unknown as [number, number];
  return {
    value: 100 * (y - x * x) ** 2 + (1 - x) ** 2,
    gradient: () => Float64Array.of(-400 * x * (y - x * x) - 2 * (1 - x), 200 * (y - x * x)),
  };
}

const box = (low: number, high: number) => [Float64Array.of(low, low), Float64Array.of(high, high)] as const;

describe('minimizeInBox(evaluate, start, low, high, iterations)', () => {
  test("finds the minimum (1, 1) of Rosenbrock's function from (−1.2, 1)", () => {
    const { point } = minimizeInBox(rosenbrock, Float64Array.of(-1.2, 1), ...box(-5, 5), 200);
    expect(point[0]).toBeCloseTo(1, 2);
    expect(point[1]).toBeCloseTo(1, 2);
  });

  test('ends at the bound that holds the minimum: (½, ¼) in the box up to ½', () => {
    // with x ≤ ½ the smallest value is (1 − ½)² at y = x² = ¼
    const { point, value } = minimizeInBox(rosenbrock, Float64Array.of(0, 0), ...box(-5, 0.5), 200);
    expect(point[0]).toBe(0.5);
    expect(point[1]).toBeCloseTo(0.25, 4);
    expect(value).toBeCloseTo(0.25, 6);
  });

  test('never ends above its start nor outside the box', () => {
    const inside = fc.double({ min: -2, max: 2, noNaN: true });
    fc.assert(
      fc.property(inside, inside, fc.integer({ min: 0, max: 30 }), (x, y, iterations) => {
        const start = Float64Array.of(x, y);
        const { point, value } = minimizeInBox(rosenbrock, start, ...box(-2, 2), iterations);
        expect(value).toBeLessThanOrEqual(rosenbrock(start).value);
        expect(point.every((coordinate) => Math.abs(coordinate) <= 2)).toBe(true);
      }),
    );
  });
});
