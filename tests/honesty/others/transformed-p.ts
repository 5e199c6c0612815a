import t from '@stdlib/stats-base-dists-t';
import { transformedInterval } from '../../../results/statistics/transformed-interval.js';

/** Two-sided p of a mean difference of 0 from Hall's transformed t (Hall 1992): see `transformedInterval`. */
export function transformedP(differences: readonly number[]): number {
  const { mean, standardError, skewness, degreesOfFreedom, n } = transformedInterval(differences);
  if (standardError === 0) return mean === 0 ? 1 : 2 ** (1 - n);
  const lambda = skewness / Math.sqrt(n);
  const T = mean / standardError;
  const transformed = T + (lambda * T ** 2) / 3 + (lambda ** 2 * T ** 3) / 27 + lambda / 6;
  return 2 * t.cdf(-Math.abs(transformed), degreesOfFreedom);
}
