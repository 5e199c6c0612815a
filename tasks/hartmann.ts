import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type BoxFunction, movedSetting, movedTask } from './moved.js';

const heights = [1, 1.2, 3, 3.2];

interface Peaks {
  /** How fast each of the four peaks falls off along each input, (4, d). */
  readonly widths: readonly (readonly number[])[];
  /** Where each peak stands, (4, d). */
  readonly centres: readonly (readonly number[])[];
}

/** The constants A and P for d = 3; P₄₁ is 0.03815, with which the published minimiser comes out to all its digits. */
const peaks3: Peaks = {
  widths: [
    [3, 10, 30],
    [0.1, 10, 35],
    [3, 10, 30],
    [0.1, 10, 35],
  ],
  centres: [
    [0.3689, 0.117, 0.2673],
    [0.4699, 0.4387, 0.747],
    [0.1091, 0.8732, 0.5547],
    [0.03815, 0.5743, 0.8828],
  ],
};

/** The constants A and P for d = 6. */
const peaks6: Peaks = {
  widths: [
    [10, 3, 17, 3.5, 1.7, 8],
    [0.05, 10, 17, 0.1, 8, 14],
    [3, 3.5, 1.7, 10, 17, 8],
    [17, 8, 0.05, 10, 0.1, 14],
  ],
  centres: [
    [0.1312, 0.1696, 0.5569, 0.0124, 0.8283, 0.5886],
    [0.2329, 0.4135, 0.8307, 0.3736, 0.1004, 0.9991],
    [0.2348, 0.1451, 0.3522, 0.2883, 0.3047, 0.665],
    [0.4047, 0.8828, 0.8732, 0.5743, 0.1091, 0.0381],
  ],
};

/**
 * f(x) = −Σ_{i≤4} α_i exp(−Σ_j A_ij (x_j − P_ij)²) on [0, 1]^d (Hartman 1973; constants as in Dixon & Szegő 1978).
 *
 * f is negative and goes to 0 far out, so it has a least value on R^d, at a stationary point. There each x_j is the
 * mean of P_1j … P_4j with weights α_i A_ij exp(…) > 0, hence between the least and the largest of them, hence inside
 * the box: the least value over the box is that over R^d.
 */
function makeBase(peaks: Peaks, minimum: number, minimizer: readonly number[]): BoxFunction {
  return {
    bounds: minimizer.map(() => [0, 1] as const),
    evaluate(x) {
      let sum = 0;
      for (let i = 0; i < 4; i++) {
        let distance = 0;
        for (let j = 0; j < x.length; j++) {
          const away = x[j]! - peaks.centres[i]![j]!;
          distance += peaks.widths[i]![j]! * away * away;
        }
        sum -= heights[i]! * Math.exp(-distance);
      }
      return sum;
    },
    minimum,
    minimizers: [minimizer],
  };
}

/** The published minimiser (0.114614, 0.555649, 0.852547), refined to a zero of the gradient. */
const base3 = makeBase(
  peaks3,
  -3.8627821478207554,
  [0.11461433858967197, 0.5556488499718569, 0.8525469535208657],
);

/** The published minimiser (0.20169, 0.150011, 0.476874, 0.275332, 0.311652, 0.6573), refined likewise. */
const base6 = makeBase(
  peaks6,
  -3.3223680114155147,
  [
    0.20168951100670543, 0.15001069182345797, 0.476873974221897, 0.2753324304940561, 0.31165161660011326,
    0.6573005340656203,
  ],
);

const source = 'Hartman 1973; Dixon & Szegő 1978';

/** Hartmann's function of 3 inputs, negated: four overlapping peaks. */
export const hartmann3 = defineTaskFamily({
  name: 'hartmann-3',
  description: 'Hartmann function of 3 columns, negated: four overlapping peaks',
  source,
  settings: z.strictObject({ moved: movedSetting }),
  make: ({ moved }, stream) => movedTask(base3, moved, stream),
});

/** Hartmann's function of 6 inputs, negated: four overlapping peaks, the two highest of nearly one height. */
export const hartmann6 = defineTaskFamily({
  name: 'hartmann-6',
  description:
    'Hartmann function of 6 columns, negated: four overlapping peaks, the two highest nearly equal',
  source,
  settings: z.strictObject({ moved: movedSetting }),
  make: ({ moved }, stream) => movedTask(base6, moved, stream),
});
