import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, dimensionsSetting, movedSetting, movedTask } from './moved.js';

/**
 * f(x) = 10 d + Σ [x_i² − 10 cos(2π x_i)] on [−5.12, 5.12]^d (Rastrigin 1974; for any d Mühlenbein, Schomisch & Born
 * 1991), written as Σ [x_i² + 20 sin²(π x_i)], which is the same without cancellation.
 *
 * Every term is at least 0 on all of R and 0 only at x_i = 0.
 */
function makeBase(dimensions: number): BoxFunction {
  return {
    bounds: Array.from({ length: dimensions }, () => [-5.12, 5.12] as const),
    evaluate(x) {
      let sum = 0;
      for (const value of x) {
        const wave = Math.sin(Math.PI * value);
        sum += value * value + 20 * wave * wave;
      }
      return sum;
    },
    minimum: 0,
    minimizers: [new Array<number>(dimensions).fill(0)],
  };
}

/** Rastrigin's function, negated: a regular grid of local optima on a bowl. */
export const rastrigin = defineTaskFamily({
  name: 'rastrigin',
  description: 'Rastrigin function, negated: a dome covered with a regular grid of local optima',
  source: 'Rastrigin 1974; Mühlenbein, Schomisch & Born 1991',
  settings: z.strictObject({ dimensions: dimensionsSetting(), moved: movedSetting }),
  make: ({ dimensions, moved }, stream) => movedTask(makeBase(dimensions), moved, stream),
});
