import t from '@stdlib/stats-base-dists-t';
import { checkShare, checkValues } from './check-values.js';
import { moments } from './moments.js';

/** Student's interval of a mean. */
export interface StudentInterval {
  readonly method: 'student-t';
  readonly n: number;
  readonly mean: number;
  readonly standardError: number;
  readonly degreesOfFreedom: number;
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Two-sided interval of a mean, mean ± t(n − 1) · standard error (Student 1908). Exact for normal values.
 *
 * @param values (n), n ≥ 2.
 * @param options.level confidence, in (0, 1); 0.95 unless given.
 * @throws RangeError for fewer than two values, one that isn't finite, or a level outside (0, 1).
 */
export function studentInterval(
  values: ArrayLike<number>,
  options: { readonly level?: number } = {},
): StudentInterval {
  const { level = 0.95 } = options;
  checkShare(level, 'level');
  checkValues(values, 'values', 2);
  const { n, mean, standardError } = moments(values);
  const degreesOfFreedom = n - 1;
  const margin = t.quantile((1 + level) / 2, degreesOfFreedom) * standardError!;
  return {
    method: 'student-t',
    n,
    mean,
    standardError: standardError!,
    degreesOfFreedom,
    level,
    low: mean - margin,
    high: mean + margin,
  };
}
