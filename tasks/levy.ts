import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, dimensionsSetting, movedSetting, movedTask } from './moved.js';

/**
 * f(x) = sin²(π w_1) + Σ_{i<d} (w_i − 1)² [1 + 10 sin²(π w_i + 1)] + (w_d − 1)² [1 + sin²(2π w_d)] with
 * w_i = 1 + (x_i − 1)/4, on [−10, 10]^d (Levy & Montalvo 1985; in this form Laguna & Martí 2005).
 *
 * Every term is a product of squares and of numbers of at least 1, so f ≥ 0 on all of R^d, with equality only where
 * every w_i, and so every x_i, is 1.
 */
function makeBase(dimensions: number): BoxFunction {
  return {
    bounds: Array.from({ length: dimensions }, () => [-10, 10] as const),
    evaluate(x) {
      const last = x.length - 1;
      // With u = w − 1 = (x − 1)/4: sin²(π w) = sin²(π u), sin²(π w + 1) = sin²(π u + 1), sin²(2π w) = sin²(2π u).
      let sum = Math.sin((Math.PI * (x[0]! - 1)) / 4) ** 2;
      for (let i = 0; i < last; i++) {
        const u = (x[i]! - 1) / 4;
        const wave = Math.sin(Math.PI * u + 1);
        sum += u * u * (1 + 10 * wave * wave);
      }
      const u = (x[last]! - 1) / 4;
      const wave = Math.sin(2 * Math.PI * u);
      return sum + u * u * (1 + wave * wave);
    },
    minimum: 0,
    minimizers: [new Array<number>(dimensions).fill(1)],
  };
}

/** Levy's function, negated: waves across a gentle bowl. */
export const levy = defineTaskFamily({
  name: 'levy',
  description: 'Levy function, negated: waves across a gentle dome',
  source: 'Levy & Montalvo 1985; Laguna & Martí 2005',
  settings: z.strictObject({ dimensions: dimensionsSetting(), moved: movedSetting }),
  make: ({ dimensions, moved }, stream) => movedTask(makeBase(dimensions), moved, stream),
});
