import { EigenvalueDecomposition, Matrix as SquareMatrix } from 'ml-matrix';
import type { Matrix } from '../../harness/designs.js';
import { rowView } from '../../harness/designs.js';

/** What one generation adds to a covariance matrix: C ← keep · C + c1 · p pᵀ + Σ weights_i · y_i y_iᵀ. */
export interface CovarianceUpdate {
  readonly keep: number;
  readonly c1: number;
  /** p, (n). */
  readonly path: Float64Array;
  /** (μ), c_μ already multiplied in. */
  readonly weights: Float64Array;
  /** (μ, n), best first. */
  readonly steps: Matrix;
}

/** The covariance matrix C of a search distribution in n dimensions; starts as the identity. */
export interface Covariance {
  /** C^½ z: a standard normal vector becomes one with covariance C. (n) to (n) */
  spread(z: Float64Array): Float64Array;
  /** C^−½ y. (n) to (n) */
  whiten(y: Float64Array): Float64Array;
  update(change: CovarianceUpdate): void;
  /** The diagonal of C, (n). */
  variances(): Float64Array;
  /** Largest over smallest eigenvalue. */
  condition(): number;
}

/** Eigenvalues are kept at or above this share of the largest, which rounding could otherwise make negative. */
const smallestShare = 1e-20;

/**
 * A full covariance matrix, O(n²) an update. Its eigenvectors, O(n³), are computed again only every `renewEvery`
 * updates (Hansen 2016, appendix B, internal numerical effort).
 */
export function fullCovariance(dimensions: number, renewEvery = 1): Covariance {
  const n = dimensions;
  const c = SquareMatrix.eye(n);
  let axes = SquareMatrix.eye(n);
  let lengths = new Float64Array(n).fill(1);
  let updates = 0;

  /** axes · diag(scale) · axesᵀ · v. Unlike axes · diag · v it does not depend on the eigenvectors' signs. */
  const through = (v: Float64Array, scale: (length: number) => number): Float64Array => {
    const turned = new Float64Array(n);
    for (let i = 0; i < n; i++) for (let k = 0; k < n; k++) turned[k]! += axes.get(i, k) * v[i]!;
    for (let k = 0; k < n; k++) turned[k]! *= scale(lengths[k]!);
    const result = new Float64Array(n);
    for (let i = 0; i < n; i++) for (let k = 0; k < n; k++) result[i]! += axes.get(i, k) * turned[k]!;
    return result;
  };

  const renew = (): void => {
    const { eigenvectorMatrix, realEigenvalues } = new EigenvalueDecomposition(c, { assumeSymmetric: true });
    const least = smallestShare * Math.max(...realEigenvalues);
    axes = eigenvectorMatrix;
    lengths = Float64Array.from(realEigenvalues, (value) => Math.sqrt(Math.max(least, value)));
  };

  return {
    spread: (z) => through(z, (length) => length),
    whiten: (y) => through(y, (length) => 1 / length),
    update({ keep, c1, path, weights, steps }) {
      for (let i = 0; i < n; i++) {
        for (let j = 0; j <= i; j++) {
          let value = keep * c.get(i, j) + c1 * path[i]! * path[j]!;
          for (let k = 0; k < weights.length; k++) {
            const at = k * n;
            value += weights[k]! * steps.values[at + i]! * steps.values[at + j]!;
          }
          c.set(i, j, value);
          c.set(j, i, value);
        }
      }
      updates++;
      if (updates % renewEvery === 0) renew();
    },
    variances: () => Float64Array.from({ length: n }, (_, i) => c.get(i, i)),
    condition: () => (Math.max(...lengths) / Math.min(...lengths)) ** 2,
  };
}

/** A diagonal covariance matrix, O(n) an update, for many dimensions (Ros & Hansen 2008). */
export function diagonalCovariance(dimensions: number): Covariance {
  const c = new Float64Array(dimensions).fill(1);
  return {
    spread(z) {
      const y = new Float64Array(dimensions);
      for (let i = 0; i < dimensions; i++) y[i] = z[i]! * Math.sqrt(c[i]!);
      return y;
    },
    whiten(y) {
      const z = new Float64Array(dimensions);
      for (let i = 0; i < dimensions; i++) z[i] = y[i]! / Math.sqrt(c[i]!);
      return z;
    },
    update({ keep, c1, path, weights, steps }) {
      for (let i = 0; i < dimensions; i++) c[i] = keep * c[i]! + c1 * path[i]! * path[i]!;
      weights.forEach((weight, k) => {
        const step = rowView(steps, k);
        for (let i = 0; i < dimensions; i++) c[i]! += weight * step[i]! * step[i]!;
      });
    },
    variances: () => c.slice(),
    condition: () => {
      let [least, most] = [c[0]!, c[0]!];
      for (let i = 1; i < dimensions; i++) {
        least = Math.min(least, c[i]!);
        most = Math.max(most, c[i]!);
      }
      return most / least;
    },
  };
}
