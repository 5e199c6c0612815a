import type { Matrix } from '../../../harness/designs.js';
import { choleskyInPlace, dot, type Factor, invertTransposed, solveFactored } from '../cholesky.js';
import type { KernelLayout } from './kernel-layout.js';
import { ScaledRows } from './scaled-rows.js';

/** Squared distances of all pairs of rows, a length scale apart, unscaled; what every likelihood evaluation shares. */
export interface PairDistances {
  readonly rows: number;
  readonly groups: number;
  /** (rows (rows − 1) / 2, groups): pair (i, j < i) stands at row i (i − 1) / 2 + j. */
  readonly values: Float64Array;
}

/** The log marginal likelihood at one place, and its gradient for whoever needs it. */
export interface Evaluation {
  readonly value: number;
  gradient(): Float64Array;
}

/** Computes the distances that `logMarginalLikelihood` needs. */
export function makePairDistances(layout: KernelLayout, x: Matrix): PairDistances {
  const { groups, groupOf, width } = layout;
  const n = x.rows;
  const values = new Float64Array(((n * (n - 1)) / 2) * groups);
  if (groups === 1) {
    const rows = new ScaledRows(
      layout,
      Float64Array.of(1),
      { rows: 0, columns: width, values: new Float64Array() },
      n,
    );
    for (let i = 0; i < n; i++) {
      const row = x.values.subarray(i * width, (i + 1) * width);
      rows.squaredDistances(row, values.subarray((i * (i - 1)) / 2));
      rows.append(row);
    }
    return { rows: n, groups, values };
  }
  for (let i = 1, at = 0; i < n; i++) {
    for (let j = 0; j < i; j++, at += groups) {
      for (let f = 0; f < width; f++) {
        const difference = x.values[i * width + f]! - x.values[j * width + f]!;
        if (difference !== 0) values[at + groupOf[f]!]! += difference * difference;
      }
    }
  }
  return { rows: n, groups, values };
}

/**
 * Log marginal likelihood of zero-mean Matérn-5/2 targets (Rasmussen & Williams 2006, eq. 5.8 through algorithm 2.1),
 * and its gradient (eq. 5.9), with respect to the logarithms of the length scales, the amplitude and the noise
 * variance, in this order. All length scales' derivatives come from one pass over the pairs.
 *
 * @param logarithms (groups + 2)
 * @param targets (n), in the units whose square the amplitude and the noise have
 * @returns value −∞ where the covariance is not positive definite in floating point; its gradient is then all NaN.
 */
export function logMarginalLikelihood(
  distances: PairDistances,
  targets: Float64Array,
  logarithms: Float64Array,
): Evaluation {
  const { rows: n, groups, values: squares } = distances;
  const weights = Float64Array.from({ length: groups }, (_, g) => Math.exp(-2 * logarithms[g]!));
  const amplitude = Math.exp(logarithms[groups]!);
  const noise = Math.exp(logarithms[groups + 1]!);
  const pairs = (n * (n - 1)) / 2;
  const kernel = new Float64Array(pairs);
  const slope = new Float64Array(pairs);
  const covariance = new Float64Array(n * n);
  for (let i = 0, p = 0; i < n; i++) {
    for (let j = 0; j < i; j++, p++) {
      const r = Math.sqrt(5 * dot(squares, p * groups, weights, 0, groups));
      const decay = amplitude * Math.exp(-r);
      kernel[p] = (1 + r + (r * r) / 3) * decay;
      slope[p] = (-5 / 6) * (1 + r) * decay;
      covariance[i * n + j] = kernel[p]!;
    }
    covariance[i * n + i] = amplitude + noise;
  }
  if (!choleskyInPlace(covariance, n)) {
    return { value: Number.NEGATIVE_INFINITY, gradient: () => new Float64Array(groups + 2).fill(Number.NaN) };
  }
  const factor: Factor = { size: n, stride: n, values: covariance };
  const alpha = solveFactored(factor, targets);
  let value = -0.5 * dot(targets, 0, alpha, 0, n) - 0.5 * n * Math.log(2 * Math.PI);
  for (let i = 0; i < n; i++) value -= Math.log(covariance[i * n + i]!);

  const gradient = (): Float64Array => {
    const inverse = invertTransposed(factor);
    const result = new Float64Array(groups + 2);
    let ofKernel = 0;
    let trace = 0;
    for (let i = 0, p = 0; i < n; i++) {
      for (let j = 0; j < i; j++, p++) {
        const weight = alpha[i]! * alpha[j]! - dot(inverse, i * n + i, inverse, j * n + i, n - i);
        ofKernel += weight * kernel[p]!;
        const change = -2 * weight * slope[p]!;
        for (let g = 0, at = p * groups; g < groups; g++, at++)
          result[g]! += change * squares[at]! * weights[g]!;
      }
      trace += alpha[i]! ** 2 - dot(inverse, i * n + i, inverse, i * n + i, n - i);
    }
    result[groups] = ofKernel + 0.5 * amplitude * trace;
    result[groups + 1] = 0.5 * noise * trace;
    return result;
  };
  return { value, gradient };
}
