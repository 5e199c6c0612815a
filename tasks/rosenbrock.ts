import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, dimensionsSetting, movedSetting, movedTask } from './moved.js';

/**
 * f(x) = Σ_{i<d} [100 (x_{i+1} − x_i²)² + (1 − x_i)²] on [−5, 10]^d, d ≥ 2 (Rosenbrock 1960 for d = 2; the chain over
 * d inputs and the box are common practice).
 *
 * A sum of squares, so at least 0 on all of R^d; it is 0 only where x_1 … x_{d−1} are 1 and x_d = x_{d−1}² = 1.
 */
function makeBase(dimensions: number): BoxFunction {
  return {
    bounds: Array.from({ length: dimensions }, () => [-5, 10] as const),
    evaluate(x) {
      let sum = 0;
      for (let i = 0; i + 1 < x.length; i++) {
        const fromValley = x[i + 1]! - x[i]! * x[i]!;
        const toOne = 1 - x[i]!;
        sum += 100 * fromValley * fromValley + toOne * toOne;
      }
      return sum;
    },
    minimum: 0,
    minimizers: [new Array<number>(dimensions).fill(1)],
  };
}

/** Rosenbrock's function, negated: a long bent valley. */
export const rosenbrock = defineTaskFamily({
  name: 'rosenbrock',
  description: 'Rosenbrock function, negated: a long bent ridge, each column tied to the next',
  source: 'Rosenbrock 1960',
  settings: z.strictObject({ dimensions: dimensionsSetting(2), moved: movedSetting }),
  make: ({ dimensions, moved }, stream) => movedTask(makeBase(dimensions), moved, stream),
});
