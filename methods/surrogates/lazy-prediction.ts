import { copyMatrix, type Matrix } from '../../harness/designs.js';
import type { Prediction } from '../parts.js';

/**
 * A prediction whose spread is worked out when it is first read: for models where a spread costs much more than a
 * mean. Keeps a copy of the rows, so that the caller may change them meanwhile.
 */
export function lazyPrediction(
  mean: Float64Array,
  x: Matrix,
  spreadAt: (x: Matrix) => Float64Array,
): Prediction {
  const asked = copyMatrix(x);
  let spread: Float64Array | undefined;
  return {
    mean,
    get spread() {
      spread ??= spreadAt(asked);
      return spread;
    },
  };
}
