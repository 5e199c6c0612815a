import type { Prediction } from '../../parts.js';

/** The mean of several networks' predictions and their standard deviation with divisor members − 1, row by row. */
export function meanAndSpread(predictions: readonly Float64Array[]): Required<Prediction> {
  const members = predictions.length;
  const rows = predictions[0]!.length;
  const mean = new Float64Array(rows);
  const spread = new Float64Array(rows);
  for (let i = 0; i < rows; i++) {
    // Summed as differences to the first member, so that members that agree have no spread from rounding.
    const first = predictions[0]![i]!;
    let sum = 0;
    for (const member of predictions) sum += member[i]! - first;
    mean[i] = first + sum / members;
    let squares = 0;
    for (const member of predictions) squares += (member[i]! - mean[i]!) ** 2;
    spread[i] = Math.sqrt(squares / (members - 1));
  }
  return { mean, spread };
}
