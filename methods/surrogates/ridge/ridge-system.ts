import { type Matrix, rowView, zeros } from '../../../harness/designs.js';
import { dot, type Factor, factorize } from '../cholesky.js';

/** How the equations are solved: over p weights, or over n rows. Both give the same regression. */
export type RidgeForm = 'primal' | 'dual';

/** What a ridge regression with any penalty is solved from. */
export interface RidgeSystem {
  readonly form: RidgeForm;
  /** Terms less their means, (n, p). */
  readonly centred: Matrix;
  /** Mean of each term, (p); zeros without intercept. */
  readonly means: Float64Array;
  /** Targets less their mean, (n). */
  readonly targets: Float64Array;
  /** Mean of the targets; 0 without intercept. */
  readonly targetMean: number;
  readonly intercept: boolean;
  /** Products of terms, (p, p), in primal form, or of rows, (n, n), in dual form; lower triangle. */
  readonly gram: Float64Array;
}

/**
 * Prepares a ridge regression of targets, (n), on terms, (n, p). The intercept is not penalized: it is taken out by
 * centring.
 *
 * @param form default: dual where there are more terms than rows
 */
export function makeRidgeSystem(
  terms: Matrix,
  targets: Float64Array,
  { intercept = true, form }: { intercept?: boolean; form?: RidgeForm } = {},
): RidgeSystem {
  const { rows: n, columns: p } = terms;
  const means = new Float64Array(p);
  const targetMean = intercept ? targets.reduce((sum, y) => sum + y / n, 0) : 0;
  if (intercept) {
    for (let i = 0; i < n; i++) for (let f = 0; f < p; f++) means[f]! += terms.values[i * p + f]! / n;
  }
  const centred = zeros(n, p);
  for (let i = 0; i < n; i++) {
    const row = rowView(centred, i);
    for (let f = 0; f < p; f++) row[f] = terms.values[i * p + f]! - means[f]!;
  }
  const chosen = form ?? (p > n ? 'dual' : 'primal');
  return {
    form: chosen,
    centred,
    means,
    targets: targets.map((y) => y - targetMean),
    targetMean,
    intercept,
    gram: chosen === 'dual' ? gramOfRows(centred) : gramOfRows(transpose(centred)),
  };
}

/** Cholesky factor of gram + penalty · I. */
export function factorizeSystem({ form, centred, gram }: RidgeSystem, penalty: number): Factor {
  const size = form === 'dual' ? centred.rows : centred.columns;
  const matrix = gram.slice();
  for (let i = 0; i < size; i++) matrix[i * size + i]! += penalty;
  return factorize(matrix, size);
}

/** Terms' products with a vector over terms, (n, p) · (p). */
export function timesTerms({ rows, columns, values }: Matrix, vector: Float64Array): Float64Array {
  return Float64Array.from({ length: rows }, (_, i) => dot(values, i * columns, vector, 0, columns));
}

/** Terms' products with a vector over rows, (p, n) · (n). */
export function timesRows({ rows, columns, values }: Matrix, vector: Float64Array): Float64Array {
  const sums = new Float64Array(columns);
  for (let i = 0; i < rows; i++) {
    for (let f = 0, at = i * columns; f < columns; f++, at++) sums[f]! += vector[i]! * values[at]!;
  }
  return sums;
}

function gramOfRows({ rows, columns, values }: Matrix): Float64Array {
  const gram = new Float64Array(rows * rows);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j <= i; j++) gram[i * rows + j] = dot(values, i * columns, values, j * columns, columns);
  }
  return gram;
}

function transpose({ rows, columns, values }: Matrix): Matrix {
  const transposed = zeros(columns, rows);
  for (let i = 0; i < rows; i++) {
    for (let f = 0; f < columns; f++) transposed.values[f * rows + i] = values[i * columns + f]!;
  }
  return transposed;
}
