import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, dimensionsSetting, movedSetting, movedTask } from './moved.js';

/**
 * The least of the three real roots of 4x³ − 32x + 5, about −2.903534, by the trigonometric solution of a cubic
 * (Viète 1615).
 */
const bestInput =
  2 * Math.sqrt(8 / 3) * Math.cos((Math.acos((-15 / 64) * Math.sqrt(3 / 8)) + 2 * Math.PI) / 3);

/**
 * f(x) = ½ Σ (x_i⁴ − 16 x_i² + 5 x_i) on [−5, 5]^d (Styblinski & Tang 1990).
 *
 * A sum of one quartic a coordinate. The quartic grows without limit both ways, and of its three stationary points
 * (the roots of 4x³ − 32x + 5) the one near 0.157 is a maximum, that near 2.747 reaches −25.03 and that near −2.904
 * reaches −39.166, its least value on all of R.
 */
function makeBase(dimensions: number): BoxFunction {
  return {
    bounds: Array.from({ length: dimensions }, () => [-5, 5] as const),
    evaluate(x) {
      let sum = 0;
      for (const value of x) sum += halfQuartic(value);
      return sum;
    },
    minimum: dimensions * halfQuartic(bestInput),
    minimizers: [new Array<number>(dimensions).fill(bestInput)],
  };
}

function halfQuartic(x: number): number {
  const square = x * x;
  return (square * square - 16 * square + 5 * x) / 2;
}

/** The Styblinski-Tang function, negated: two unequal peaks in every column, 2^d in all. */
export const styblinskiTang = defineTaskFamily({
  name: 'styblinski-tang',
  description: 'Styblinski-Tang function, negated: two unequal peaks in every column, 2^d in all',
  source: 'Styblinski & Tang 1990',
  settings: z.strictObject({ dimensions: dimensionsSetting(), moved: movedSetting }),
  make: ({ dimensions, moved }, stream) => movedTask(makeBase(dimensions), moved, stream),
});
