import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, movedSetting, movedTask } from './moved.js';

/**
 * f(x) = (x₂ − 5.1/(4π²) x₁² + 5/π x₁ − 6)² + 10 (1 − 1/(8π)) cos x₁ + 10 on [−5, 10] × [0, 15] (Branin 1972; in this
 * form Dixon & Szegő 1978).
 *
 * The square is at least 0 and the cosine at least −1, so f ≥ 10/(8π) = 5/(4π) on all of R², with equality where
 * cos x₁ = −1 and the square is 0: at three points of the box.
 */
const base: BoxFunction = {
  bounds: [
    [-5, 10],
    [0, 15],
  ],
  evaluate(x) {
    const x1 = x[0]!;
    const valley = x[1]! - (5.1 / (4 * Math.PI ** 2)) * x1 * x1 + (5 / Math.PI) * x1 - 6;
    return valley * valley + 10 * (1 - 1 / (8 * Math.PI)) * Math.cos(x1) + 10;
  },
  minimum: 5 / (4 * Math.PI),
  minimizers: [
    [Math.PI, 2.275],
    [-Math.PI, 12.275],
    [3 * Math.PI, 2.475],
  ],
};

/** Branin's function, negated: two columns, three optima of one value. */
export const branin = defineTaskFamily({
  name: 'branin',
  description:
    'Branin function, negated: 2 columns, three equal optima (a moved instance keeps at least one)',
  source: 'Branin 1972; Dixon & Szegő 1978',
  settings: z.strictObject({ moved: movedSetting }),
  make: ({ moved }, stream) => movedTask(base, moved, stream),
});
