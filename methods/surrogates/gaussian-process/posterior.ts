import { type Matrix, rowView, zeros } from '../../../harness/designs.js';
import {
  dot,
  type Factor,
  factorize,
  solveFactored,
  solveLowerInPlace,
  solveUpperInPlace,
} from '../cholesky.js';
import type { HyperParameters } from './hyper-parameters.js';
import type { KernelLayout } from './kernel-layout.js';
import { matern52, matern52Slope } from './matern.js';
import { ScaledRows } from './scaled-rows.js';

/** Rows whose posterior variance is kept up to date while designs are believed. */
export interface TrackedRows {
  readonly x: Matrix;
  /** Latent mean, (m); believing a design does not change it. */
  readonly mean: Float64Array;
  /** Latent variance, (m). */
  readonly variance: Float64Array;
  /** L⁻¹ k, one row each, (m, capacity). */
  readonly whitened: Matrix;
}

/**
 * The exact posterior of a zero-mean Gaussian process with Matérn-5/2 kernel after n noisy targets (Rasmussen &
 * Williams 2006, algorithm 2.1). Means, variances and covariances are those of the latent function, without noise, in
 * units of the targets. Building costs n³/6 multiplications, a mean n · d, a variance n²/2.
 */
export class GaussianPosterior {
  readonly hyperParameters: HyperParameters;
  readonly rows: ScaledRows;
  /** Targets of all rows, believed ones included, (capacity); the first `rows.size` are in use. */
  readonly targets: Float64Array;
  /** (K + noise · I)⁻¹ · targets, (capacity). */
  readonly #alpha: Float64Array;
  #factor: Factor;
  readonly #squares: Float64Array;
  readonly #kernels: Float64Array;

  /**
   * @param x encoded rows, (n, width)
   * @param targets (n)
   * @param room how many designs can be believed later
   * @throws OnebatchError (`numeric`) when the covariance can't be factorized.
   */
  constructor(
    layout: KernelLayout,
    hyperParameters: HyperParameters,
    x: Matrix,
    targets: Float64Array,
    room = 0,
  ) {
    const n = x.rows;
    this.hyperParameters = hyperParameters;
    this.rows = new ScaledRows(layout, hyperParameters.lengthScales, x, room);
    this.#squares = new Float64Array(n + room);
    this.#kernels = new Float64Array(n + room);
    const covariance = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      covariance.set(this.kernels(rowView(x, i)), i * n);
      covariance[i * n + i] = hyperParameters.amplitude + hyperParameters.noise;
    }
    this.#factor = factorize(covariance, n, room);
    this.targets = new Float64Array(n + room);
    this.targets.set(targets);
    this.#alpha = new Float64Array(n + room);
    this.#alpha.set(solveFactored(this.#factor, targets));
  }

  /** Prior covariance of `row` with each row of the posterior, (n); overwritten by the next call of any method. */
  kernels(row: Float64Array): Float64Array {
    const n = this.rows.size;
    this.rows.squaredDistances(row, this.#squares);
    for (let i = 0; i < n; i++)
      this.#kernels[i] = this.hyperParameters.amplitude * matern52(this.#squares[i]!);
    return this.#kernels.subarray(0, n);
  }

  /** (K + noise · I)⁻¹ b, (n). */
  solve(b: Float64Array): Float64Array {
    return solveFactored(this.#factor, b);
  }

  /** Posterior mean, (m, width) to (m). */
  mean(x: Matrix): Float64Array {
    const mean = new Float64Array(x.rows);
    for (let i = 0; i < x.rows; i++)
      mean[i] = dot(this.kernels(rowView(x, i)), 0, this.#alpha, 0, this.rows.size);
    return mean;
  }

  /** Posterior variance, (m, width) to (m); never negative. */
  variance(x: Matrix): Float64Array {
    const variance = new Float64Array(x.rows);
    const n = this.rows.size;
    for (let i = 0; i < x.rows; i++) {
      const whitened = this.kernels(rowView(x, i));
      solveLowerInPlace(this.#factor, whitened);
      variance[i] = Math.max(0, this.hyperParameters.amplitude - dot(whitened, 0, whitened, 0, n));
    }
    return variance;
  }

  /** Gradient of mean − spreadWeight · √variance with respect to encoded rows, (m, width) to (m, width). */
  gradient(x: Matrix, spreadWeight: number): Matrix {
    const gradient = zeros(x.rows, x.columns);
    const n = this.rows.size;
    for (let i = 0; i < x.rows; i++) {
      const row = rowView(x, i);
      const weights = this.#alpha.slice(0, n);
      if (spreadWeight !== 0) {
        const solved = this.kernels(row).slice();
        solveLowerInPlace(this.#factor, solved);
        const variance = this.hyperParameters.amplitude - dot(solved, 0, solved, 0, n);
        solveUpperInPlace(this.#factor, solved);
        const scale = spreadWeight / Math.sqrt(Math.max(variance, 1e-12 * this.hyperParameters.amplitude));
        for (let k = 0; k < n; k++) weights[k]! += scale * solved[k]!;
      }
      this.addKernelGradient(row, weights, rowView(gradient, i));
    }
    return gradient;
  }

  /** Adds to `into`, (width), the gradient at `row` of Σ over the posterior's rows of weight · kernel. */
  addKernelGradient(row: Float64Array, weights: Float64Array, into: Float64Array): void {
    this.rows.squaredDistances(row, this.#squares);
    const coefficients = this.#kernels;
    for (let k = 0; k < this.rows.size; k++) {
      coefficients[k] = weights[k]! * this.hyperParameters.amplitude * matern52Slope(this.#squares[k]!);
    }
    this.rows.addDistanceGradient(row, coefficients, into);
  }

  /** Starts keeping the variance of rows, (m, width), up to date. */
  track(x: Matrix): TrackedRows {
    const n = this.rows.size;
    const whitened = zeros(x.rows, this.#factor.stride);
    const mean = new Float64Array(x.rows);
    const variance = new Float64Array(x.rows);
    for (let i = 0; i < x.rows; i++) {
      const row = rowView(whitened, i);
      row.set(this.kernels(rowView(x, i)));
      mean[i] = dot(row, 0, this.#alpha, 0, n);
      solveLowerInPlace(this.#factor, row);
      variance[i] = Math.max(0, this.hyperParameters.amplitude - dot(row, 0, row, 0, n));
    }
    return { x, mean, variance, whitened };
  }

  /** Posterior covariance of each tracked row with `row`, (m). */
  covariances(tracked: TrackedRows, row: Float64Array): Float64Array {
    const n = this.rows.size;
    const own = this.kernels(row).slice();
    solveLowerInPlace(this.#factor, own);
    const one = new ScaledRows(this.rows.layout, this.hyperParameters.lengthScales, {
      rows: 1,
      columns: row.length,
      values: row,
    });
    const square = new Float64Array(1);
    return Float64Array.from({ length: tracked.x.rows }, (_, i) => {
      one.squaredDistances(rowView(tracked.x, i), square);
      const prior = this.hyperParameters.amplitude * matern52(square[0]!);
      return prior - dot(own, 0, tracked.whitened.values, i * tracked.whitened.columns, n);
    });
  }

  /**
   * Adds a design as if its posterior mean had been measured there (the kriging believer, Ginsbourger et al. 2010):
   * one more row of the Cholesky factor, n²/2 multiplications. Means stay as they are, variances shrink; those of
   * `tracked` are updated.
   *
   * @throws RangeError when there is no room left.
   */
  believe(row: Float64Array, tracked?: TrackedRows): void {
    const n = this.rows.size;
    const { stride, values } = this.#factor;
    if (n >= stride) throw new RangeError(`the posterior has no room for more than ${stride} rows`);
    const covariances = tracked === undefined ? undefined : this.covariances(tracked, row);
    const whitened = this.kernels(row);
    const mean = dot(whitened, 0, this.#alpha, 0, n);
    solveLowerInPlace(this.#factor, whitened);
    const { amplitude, noise } = this.hyperParameters;
    const pivot = Math.sqrt(
      Math.max(amplitude + noise - dot(whitened, 0, whitened, 0, n), 1e-10 * amplitude),
    );
    values.set(whitened, n * stride);
    values[n * stride + n] = pivot;
    this.#factor = { size: n + 1, stride, values };
    this.targets[n] = mean;
    this.rows.append(row);
    if (tracked === undefined || covariances === undefined) return;
    for (let i = 0; i < tracked.x.rows; i++) {
      const entry = covariances[i]! / pivot;
      tracked.whitened.values[i * stride + n] = entry;
      tracked.variance[i] = Math.max(0, tracked.variance[i]! - entry * entry);
    }
  }
}
