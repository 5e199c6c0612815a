import { type Designs, rowView } from '../harness/designs.js';

/** The score of each row, (n, d) to (n); `score` gets a view on the row and must not write to it. */
export function scoreRows(designs: Designs, score: (row: Float64Array) => number): Float64Array {
  const scores = new Float64Array(designs.rows);
  for (let i = 0; i < designs.rows; i++) scores[i] = score(rowView(designs, i));
  return scores;
}
