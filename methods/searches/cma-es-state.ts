import { type Matrix, orderByDescending, rowView, takeRows, zeros } from '../../harness/designs.js';
import type { Stream } from '../../harness/random.js';
import { type CmaEsParameters, type CovarianceShape, cmaEsParameters } from './cma-es-parameters.js';
import { type Covariance, diagonalCovariance, fullCovariance } from './covariance.js';

/** Where a run starts and what it learns. */
export interface CmaEsStart {
  /** m, (n): the first mean. Copied. */
  readonly mean: Float64Array;
  /** σ above 0, in the units of the mean. */
  readonly sigma: number;
  /** λ; by default 4 + ⌊3 ln n⌋. */
  readonly population?: number;
  /** Default `full`. */
  readonly shape?: CovarianceShape;
}

/** Why a run has nothing left to find: see {@link CmaEs.stopReason}. */
export type CmaEsStop = 'flat' | 'small-steps' | 'bad-condition';

/**
 * The covariance matrix adaptation evolution strategy in Rⁿ, without bounds (Hansen 2016, arXiv:1604.00772, figure 6),
 * as two turns: `ask` draws a generation, `tell` learns from its values. Larger values are better, and only their
 * order counts.
 */
export class CmaEs {
  readonly parameters: CmaEsParameters;
  readonly #mean: Float64Array;
  readonly #covariance: Covariance;
  readonly #firstSigma: number;
  readonly #sigmaPath: Float64Array;
  readonly #covariancePath: Float64Array;
  readonly #bestValues: number[] = [];
  #lastValues: Float64Array = new Float64Array();
  #sigma: number;
  #generation = 0;

  constructor({ mean, sigma, population, shape = 'full' }: CmaEsStart) {
    const n = mean.length;
    this.parameters = cmaEsParameters(n, { shape, ...(population === undefined ? {} : { population }) });
    const { c1, cMu } = this.parameters;
    // Hansen 2016, appendix B, internal numerical effort: the eigenvectors may be max(1, ⌊1 / (10 n (c1 + c_μ))⌋) generations old.
    const renewEvery = Math.max(1, Math.floor(1 / (10 * n * (c1 + cMu))));
    this.#covariance = shape === 'full' ? fullCovariance(n, renewEvery) : diagonalCovariance(n);
    this.#mean = mean.slice();
    this.#sigma = sigma;
    this.#firstSigma = sigma;
    this.#sigmaPath = new Float64Array(n);
    this.#covariancePath = new Float64Array(n);
  }

  /** m, (n): a copy. */
  get mean(): Float64Array {
    return this.#mean.slice();
  }

  /** σ, the overall step size. */
  get sigma(): number {
    return this.#sigma;
  }

  /** Generations told so far. */
  get generation(): number {
    return this.#generation;
  }

  /** Draws λ points from N(m, σ² C), (λ, n). */
  ask(stream: Stream): Matrix {
    const n = this.#mean.length;
    const points = zeros(this.parameters.population, n);
    const normal = new Float64Array(n);
    for (let k = 0; k < points.rows; k++) {
      const point = rowView(points, k);
      for (let i = 0; i < n; i++) normal[i] = stream.normal();
      const step = this.#covariance.spread(normal);
      for (let i = 0; i < n; i++) point[i] = this.#mean[i]! + this.#sigma * step[i]!;
    }
    return points;
  }

  /** Learns from a generation: points as `ask` gave them, (λ, n), and their values, (λ), without NaN. */
  tell(points: Matrix, values: Float64Array): void {
    const { parents, weights } = this.parameters;
    const order = orderByDescending(values);
    const steps = takeRows(points, order.slice(0, parents));
    for (let k = 0; k < parents; k++) {
      const step = rowView(steps, k);
      for (let i = 0; i < step.length; i++) step[i] = (step[i]! - this.#mean[i]!) / this.#sigma;
    }
    const shift = new Float64Array(points.columns);
    weights.forEach((weight, k) => {
      const step = rowView(steps, k);
      for (let i = 0; i < shift.length; i++) shift[i]! += weight * step[i]!;
    });
    for (let i = 0; i < shift.length; i++) this.#mean[i]! += this.#sigma * shift[i]!;
    this.#adapt(shift, steps);
    this.#generation++;
    this.#lastValues = values.slice();
    this.#bestValues.push(values[order[0]!]!);
  }

  /**
   * Why going on is pointless, or `undefined` (Hansen 2016, appendix B, termination criteria): `flat`, the best values of the last
   * 10 + ⌈30 n / λ⌉ generations and all values of the last one lie within 1e-12; `small-steps`, σ · p_c and σ times
   * every standard deviation are below 1e-12 of the first σ; `bad-condition`, the condition number is above 1e14.
   */
  stopReason(): CmaEsStop | undefined {
    const n = this.#mean.length;
    const window = 10 + Math.ceil((30 * n) / this.parameters.population);
    if (this.#bestValues.length >= window) {
      const recent = [...this.#bestValues.slice(-window), ...this.#lastValues];
      if (Math.max(...recent) - Math.min(...recent) < 1e-12) return 'flat';
    }
    const reach = 1e-12 * this.#firstSigma;
    const small = this.#covariance.variances().every((v) => this.#sigma * Math.sqrt(v) < reach);
    if (small && this.#covariancePath.every((p) => this.#sigma * Math.abs(p) < reach)) return 'small-steps';
    return this.#covariance.condition() > 1e14 ? 'bad-condition' : undefined;
  }

  /** Paths, step size and covariance matrix, from the weighted mean step and the parents' steps. */
  #adapt(shift: Float64Array, steps: Matrix): void {
    const { weights, effectiveParents, cSigma, dSigma, cC, c1, cMu, expectedNorm } = this.parameters;
    const n = shift.length;
    const whitened = this.#covariance.whiten(shift);
    const sigmaRate = Math.sqrt(cSigma * (2 - cSigma) * effectiveParents);
    let square = 0;
    for (let i = 0; i < n; i++) {
      const p = (1 - cSigma) * this.#sigmaPath[i]! + sigmaRate * whitened[i]!;
      this.#sigmaPath[i] = p;
      square += p * p;
    }
    const norm = Math.sqrt(square);
    const settled = Math.sqrt(1 - (1 - cSigma) ** (2 * (this.#generation + 1)));
    const moving = norm / settled < (1.4 + 2 / (n + 1)) * expectedNorm ? 1 : 0;
    const pathRate = moving * Math.sqrt(cC * (2 - cC) * effectiveParents);
    for (let i = 0; i < n; i++) {
      this.#covariancePath[i] = (1 - cC) * this.#covariancePath[i]! + pathRate * shift[i]!;
    }
    this.#sigma *= Math.exp((cSigma / dSigma) * (norm / expectedNorm - 1));
    this.#covariance.update({
      keep: 1 + c1 * (1 - moving) * cC * (2 - cC) - c1 - cMu,
      c1,
      path: this.#covariancePath,
      weights: weights.map((weight) => cMu * weight),
      steps,
    });
  }
}
