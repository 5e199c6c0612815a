import { type Matrix, zeros } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import { type Column, countValues } from '../../../harness/space.js';

/** Moves every encoded feature to mean 0 and standard deviation 1 over designs drawn uniformly from the space. */
export interface InputScaling {
  readonly shifts: Float64Array;
  readonly factors: Float64Array;
}

/** The scaling that a space's encoding calls for: it depends on the space alone, never on the table. */
export function makeScaling(encoding: Encoding): InputScaling {
  const shifts = new Float64Array(encoding.width);
  const factors = new Float64Array(encoding.width);
  for (const { column, offset, width } of encoding.blocks) {
    shifts.fill(column.kind === 'category' ? 1 / width : 0.5, offset, offset + width);
    factors.fill(1 / deviationOf(column), offset, offset + width);
  }
  return { shifts, factors };
}

/** Standard deviation of an encoded feature of the column: of a level's 0 or 1, of k equal steps, of a whole range. */
function deviationOf(column: Column): number {
  const values = countValues(column);
  if (column.kind === 'category') return Math.sqrt(values - 1) / values;
  return Math.sqrt(column.kind === 'integer' ? (values + 1) / (12 * (values - 1)) : 1 / 12);
}

/** Encoded rows as a network's inputs, (n × width) in 32-bit floats. */
export function scaleInputs(
  { shifts, factors }: InputScaling,
  { rows, columns, values }: Matrix,
): Float32Array {
  const scaled = new Float32Array(values.length);
  for (let i = 0, k = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++, k++) scaled[k] = (values[k]! - shifts[j]!) * factors[j]!;
  }
  return scaled;
}

/** Gradients by a network's inputs as gradients by encoded features, each times `outputScale`. */
export function unscaleGradients(
  { factors }: InputScaling,
  gradients: Float32Array,
  outputScale: number,
): Matrix {
  const unscaled = zeros(gradients.length / factors.length, factors.length);
  for (let i = 0, k = 0; i < unscaled.rows; i++) {
    for (let j = 0; j < unscaled.columns; j++, k++) {
      unscaled.values[k] = gradients[k]! * factors[j]! * outputScale;
    }
  }
  return unscaled;
}
