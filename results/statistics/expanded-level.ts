import normal from '@stdlib/stats-base-dists-normal';
import t from '@stdlib/stats-base-dists-t';
import { checkCount, checkShare } from './check-values.js';

/**
 * The level that a percentile bootstrap is taken at so that its interval is not too short for few values: the expanded
 * percentile interval (Hesterberg 2015, section 5.3). A bootstrap's spread is √((n − 1)/n) of what it should be, and it
 * takes no account of the deviation being estimated: both are made good by 2 Φ(√(n/(n − 1)) · t₍₁₊level₎⸝₂) − 1. For
 * values of several tasks n − 1 becomes the number of values less that of tasks.
 *
 * @param level confidence asked for, in (0, 1).
 * @param sample.values number of values, more than `sample.tasks`.
 * @param sample.tasks groups within which values are redrawn; 1 unless given.
 * @throws RangeError for a level outside (0, 1), or no more values than tasks.
 */
export function expandedLevel(
  level: number,
  sample: { readonly values: number; readonly tasks?: number },
): number {
  const { values, tasks = 1 } = sample;
  checkShare(level, 'level');
  checkCount(tasks, 'tasks');
  checkCount(values, 'values', tasks + 1);
  const degreesOfFreedom = values - tasks;
  const reach = Math.sqrt(values / degreesOfFreedom) * t.quantile((1 + level) / 2, degreesOfFreedom);
  return 2 * normal.cdf(reach, 0, 1) - 1;
}
