import { rowView } from '../../../harness/designs.js';
import { dot, inverseDiagonal, solveFactored, solveLowerInPlace } from '../cholesky.js';
import { factorizeSystem, type RidgeSystem, timesRows, timesTerms } from './ridge-system.js';

/**
 * Residual of each row when it is left out of the regression, (n), in closed form: residual / (1 − leverage) (Allen
 * 1974), with the intercept's share 1/n in the leverage.
 */
export function leaveOneOutResiduals(system: RidgeSystem, penalty: number): Float64Array {
  const { form, centred, targets, intercept } = system;
  const n = centred.rows;
  const factor = factorizeSystem(system, penalty);
  const ofIntercept = intercept ? 1 / n : 0;
  if (form === 'dual') {
    const diagonal = inverseDiagonal(factor);
    return solveFactored(factor, targets).map(
      (a, i) => (penalty * a) / (penalty * diagonal[i]! - ofIntercept),
    );
  }
  const fitted = timesTerms(centred, solveFactored(factor, timesRows(centred, targets)));
  return targets.map((y, i) => {
    const whitened = rowView(centred, i).slice();
    solveLowerInPlace(factor, whitened);
    return (y - fitted[i]!) / (1 - ofIntercept - dot(whitened, 0, whitened, 0, whitened.length));
  });
}

/**
 * The penalty with the smallest mean squared leave-one-out residual: of the powers of ten from 10⁻³ to 10⁴, then of the
 * half decades beside the best. Of equals the largest; 1 for a table of fewer than three rows, where nothing can be
 * compared.
 */
export function choosePenalty(system: RidgeSystem): number {
  if (system.centred.rows < 3) return 1;
  const error = (exponent: number) =>
    leaveOneOutResiduals(system, 10 ** exponent).reduce((sum, residual) => sum + residual ** 2, 0);
  let best = { exponent: 4, error: error(4) };
  const consider = (exponent: number) => {
    const candidate = { exponent, error: error(exponent) };
    if (candidate.error < best.error) best = candidate;
  };
  for (let exponent = 3; exponent >= -3; exponent--) consider(exponent);
  const { exponent } = best;
  consider(exponent + 0.5);
  consider(exponent - 0.5);
  return 10 ** best.exponent;
}
