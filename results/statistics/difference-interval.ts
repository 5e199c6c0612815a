import t from '@stdlib/stats-base-dists-t';
import type { Stream } from '../../harness/random.js';
import { bcaMeanInterval } from './bca.js';
import { checkShare } from './check-values.js';
import type { Resampler } from './resampler.js';
import { stratifiedMean } from './stratified-mean.js';

/** Up to so many pairs the interval of a mean difference is Student's; beyond, it is bootstrapped. */
export const studentUpTo = 100;

/** Bounds of a mean paired difference, and what made them. */
export interface DifferenceInterval {
  /**
   * `student-t` and `bca` on one task, `stratified-t` over several; `constant` where all differences of a task are
   * equal, on every task: both bounds are then at the mean.
   */
  readonly method: 'student-t' | 'bca' | 'stratified-t' | 'constant';
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Interval of a mean paired difference; the one place that decides which kind.
 *
 * - One task: Student's t (Student 1908) up to 100 pairs, for differences between two methods on the same seed are
 *   far less skewed than scores, and BCa intervals of few values are too short; BCa (Efron 1987) beyond.
 * - Several tasks: mean of task means ± t · standard error, with Satterthwaite's degrees of freedom
 *   (Satterthwaite 1946), which keeps its level with few seeds a task, where the stratified bootstrap is too short.
 *
 * @param tasks paired differences, one array a task.
 * @param options.level confidence, in (0, 1); 0.95 unless given.
 * @param options.resampler resamples shared between intervals, instead of 10,000 drawn from the stream.
 * @returns `null` where a task has a single pair, which tells nothing of its spread.
 * @throws RangeError for no task, a task without a value, one that isn't finite, or a level outside (0, 1).
 */
export function differenceInterval(
  tasks: readonly ArrayLike<number>[],
  options: { readonly level?: number } & ({ readonly stream: Stream } | { readonly resampler: Resampler }),
): DifferenceInterval | null {
  const { level = 0.95 } = options;
  checkShare(level, 'level');
  const { mean, n, standardError, degreesOfFreedom } = stratifiedMean(tasks);
  if (standardError === undefined) return null;
  if (degreesOfFreedom === undefined) return { method: 'constant', level, low: mean, high: mean };
  if (tasks.length === 1 && n > studentUpTo) {
    const drawn =
      'resampler' in options
        ? { replicates: options.resampler.meanDeviations(tasks[0]!) }
        : { stream: options.stream };
    const { low, high } = bcaMeanInterval(tasks[0]!, { level, ...drawn });
    return { method: 'bca', level, low, high };
  }
  const reach = t.quantile((1 + level) / 2, degreesOfFreedom) * standardError;
  const method = tasks.length === 1 ? 'student-t' : 'stratified-t';
  return { method, level, low: mean - reach, high: mean + reach };
}
