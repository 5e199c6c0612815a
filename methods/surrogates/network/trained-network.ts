import type { Matrix } from '../../../harness/designs.js';

/** How a network's outputs become scores: score = mean + deviation · output. */
export interface OutputScaling {
  readonly mean: number;
  readonly deviation: number;
}

/** What a trained network can be asked; what trains it can be replaced behind this. */
export interface Network {
  /** Predicted scores of encoded rows, (n, width) to (n). */
  predict(x: Matrix): Float64Array;
  /** Predicted scores and their gradients with respect to the encoded rows, (n) and (n, width). */
  predictWithGradient(x: Matrix): { scores: Float64Array; gradient: Matrix };
}
