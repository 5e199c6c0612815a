import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, dimensionsSetting, movedSetting, movedTask } from './moved.js';

/**
 * f(x) = −20 exp(−0.2 √(Σ x_i² / d)) − exp(Σ cos(2π x_i) / d) + 20 + e on [−32.768, 32.768]^d (Ackley 1987), written as
 * 20 (1 − exp(…)) + (e − exp(…)) so that its least value is 0 without rounding.
 *
 * The first exponential is at most 1 and the mean cosine at most 1, so both brackets are at least 0 on all of R^d,
 * and both are 0 only at x = 0.
 */
function makeBase(dimensions: number): BoxFunction {
  return {
    bounds: Array.from({ length: dimensions }, () => [-32.768, 32.768] as const),
    evaluate(x) {
      let squares = 0;
      let cosines = 0;
      for (const value of x) {
        squares += value * value;
        cosines += Math.cos(2 * Math.PI * value);
      }
      const bowl = -20 * Math.expm1(-0.2 * Math.sqrt(squares / x.length));
      return bowl + (Math.exp(1) - Math.exp(cosines / x.length));
    },
    minimum: 0,
    minimizers: [new Array<number>(dimensions).fill(0)],
  };
}

/** Ackley's function, negated: nearly flat far out, rippled everywhere, one narrow peak. */
export const ackley = defineTaskFamily({
  name: 'ackley',
  description: 'Ackley function, negated: a rippled plain with one narrow peak',
  source: 'Ackley 1987',
  settings: z.strictObject({ dimensions: dimensionsSetting(), moved: movedSetting }),
  make: ({ dimensions, moved }, stream) => movedTask(makeBase(dimensions), moved, stream),
});
