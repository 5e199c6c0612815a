import t from '@stdlib/stats-base-dists-t';
import { checkShare } from './check-values.js';
import { stratifiedMean } from './stratified-mean.js';

/** Bounds of a mean of task means, and what made them. */
export interface StratifiedTInterval {
  /**
   * `student-t` on one task, `stratified-t` over several; `constant` where all values of a task are equal, on every
   * task: both bounds are then at the mean.
   */
  readonly method: 'student-t' | 'stratified-t' | 'constant';
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Interval of a mean of task means, mean ± t · standard error, with Satterthwaite's degrees of freedom
 * (Satterthwaite 1946): it keeps its level with few seeds a task, where the stratified bootstrap is too short. For one
 * task it is Student's (Student 1908), which suits paired differences: they are less skewed than scores.
 *
 * @param tasks values, one array a task.
 * @param options.level confidence, in (0, 1); 0.95 unless given.
 * @returns `null` where a task has a single value, which tells nothing of its spread.
 * @throws RangeError for no task, a task without a value, one that isn't finite, or a level outside (0, 1).
 */
export function stratifiedInterval(
  tasks: readonly ArrayLike<number>[],
  options: { readonly level?: number } = {},
): StratifiedTInterval | null {
  const { level = 0.95 } = options;
  checkShare(level, 'level');
  const { mean, standardError, degreesOfFreedom } = stratifiedMean(tasks);
  if (standardError === undefined) return null;
  if (degreesOfFreedom === undefined) return { method: 'constant', level, low: mean, high: mean };
  const reach = t.quantile((1 + level) / 2, degreesOfFreedom) * standardError;
  const method = tasks.length === 1 ? 'student-t' : 'stratified-t';
  return { method, level, low: mean - reach, high: mean + reach };
}
