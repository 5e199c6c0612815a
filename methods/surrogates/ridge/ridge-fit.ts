import { type Matrix, rowView } from '../../../harness/designs.js';
import type { Stream } from '../../../harness/random.js';
import { dot, type Factor, solveFactored, solveUpperInPlace } from '../cholesky.js';
import { factorizeSystem, type RidgeSystem, timesRows, timesTerms } from './ridge-system.js';

/** A ridge regression and its Bayesian posterior: weights N(weights, noise · (ΦᵀΦ + penalty · I)⁻¹). */
export interface RidgeFit {
  readonly penalty: number;
  /** (p) */
  readonly weights: Float64Array;
  readonly intercept: number;
  /** Estimated variance of the measurement noise, in squared score units. */
  readonly noise: number;
  /** Predicted scores of rows of terms, (m, p) to (m). */
  mean(terms: Matrix): Float64Array;
  /** Variance of those predictions, measurement noise not included, (m). */
  variance(terms: Matrix): Float64Array;
  /** Gradient of half the variance with respect to one row of terms, (p). */
  halfVarianceGradient(row: Float64Array): Float64Array;
  /** Weights drawn from the posterior, with their deviation from its mean multiplied by `inflation`, (p). */
  drawWeights(stream: Stream, inflation?: number): Float64Array;
}

/**
 * Solves min ‖y − Φw‖² + penalty ‖w‖² (Hoerl & Kennard 1970), and takes it as the posterior under weights
 * N(0, noise / penalty) (Rasmussen & Williams 2006, section 2.1.1). The noise variance is the one that maximizes the
 * marginal likelihood with the ratio held at the penalty: targets · residuals / (n − 1).
 *
 * @param penalty above 0 in dual form; 0 is least squares in primal form
 */
export function fitRidge(system: RidgeSystem, penalty: number): RidgeFit {
  const { centred, means, targets, form, targetMean } = system;
  const n = centred.rows;
  const factor = factorizeSystem(system, penalty);
  const weights =
    form === 'primal'
      ? solveFactored(factor, timesRows(centred, targets))
      : timesRows(centred, solveFactored(factor, targets));
  const fitted = timesTerms(centred, weights);
  const noise =
    Math.max(
      0,
      targets.reduce((sum, y, i) => sum + y * (y - fitted[i]!), 0),
    ) / Math.max(1, n - 1);
  const intercept = targetMean - dot(weights, 0, means, 0, weights.length);
  const centre = (row: Float64Array) => row.map((value, f) => value - means[f]!);
  const solve = (vector: Float64Array) => solveNormal(system, factor, penalty, vector);

  return {
    penalty,
    weights,
    intercept,
    noise,
    mean: (terms) => timesTerms(terms, weights).map((value) => value + intercept),
    variance: (terms) =>
      Float64Array.from({ length: terms.rows }, (_, i) => {
        const row = centre(rowView(terms, i));
        const ofIntercept = system.intercept ? 1 / n : 0;
        return noise * Math.max(0, ofIntercept + dot(row, 0, solve(row), 0, row.length));
      }),
    halfVarianceGradient: (row) => solve(centre(row)).map((value) => noise * value),
    drawWeights(stream, inflation = 1) {
      const size = inflation * Math.sqrt(noise);
      const deviation =
        form === 'primal' ? drawPrimal(factor, stream) : drawDual(system, factor, penalty, stream);
      return weights.map((value, f) => value + size * deviation[f]!);
    },
  };
}

/** (ΦᵀΦ + penalty · I)⁻¹ v, (p), in dual form by the identity of Woodbury (1950). */
function solveNormal(
  { form, centred }: RidgeSystem,
  factor: Factor,
  penalty: number,
  v: Float64Array,
): Float64Array {
  if (form === 'primal') return solveFactored(factor, v);
  const inner = timesRows(centred, solveFactored(factor, timesTerms(centred, v)));
  return v.map((value, f) => (value - inner[f]!) / penalty);
}

function drawPrimal(factor: Factor, stream: Stream): Float64Array {
  const draw = Float64Array.from({ length: factor.size }, () => stream.normal());
  solveUpperInPlace(factor, draw);
  return draw;
}

/** A draw from the prior, corrected by what it would have been measured as (Matheron's rule, Wilson et al. 2020). */
function drawDual({ centred }: RidgeSystem, factor: Factor, penalty: number, stream: Stream): Float64Array {
  const prior = Float64Array.from({ length: centred.columns }, () => stream.normal() / Math.sqrt(penalty));
  const measured = timesTerms(centred, prior).map((value) => value + stream.normal());
  const correction = timesRows(centred, solveFactored(factor, measured));
  return prior.map((value, f) => value - correction[f]!);
}
