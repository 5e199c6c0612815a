import { orderByDescending } from '../../harness/designs.js';
import type { Stream } from '../../harness/random.js';
import { defaultResamples } from './bca.js';
import { checkCount, checkShare, checkValues } from './check-values.js';
import { quantileSorted } from './quantile.js';
import { redrawRuns, stackTasks, type TaskRuns } from './task-runs.js';

/** The share of runs above each score, with a band. */
export interface PerformanceProfile {
  readonly method: 'stratified-percentile-pointwise';
  readonly tasks: number;
  readonly level: number;
  readonly resamples: number;
  /** The scores asked for, (thresholds), in the order given. */
  readonly thresholds: readonly number[];
  /** Mean over tasks of the share of runs with a score above the threshold, (thresholds). */
  readonly shares: readonly number[];
  /** Bounds of the band, (thresholds); the level holds at each threshold for itself, not for the whole curve. */
  readonly low: readonly number[];
  readonly high: readonly number[];
}

/**
 * Performance profile, or score distribution (Agarwal et al. 2021): for each threshold the share of runs
 * that score strictly above it, every task weighing the same, with pointwise percentile bands from runs redrawn
 * within tasks.
 *
 * @param tasks one array of scores a task, one score a seed; tasks may differ in their number of runs.
 * @param options.thresholds scores at which the profile is wanted, at least one, in any order.
 * @throws RangeError for no task, a task without a run, a score or threshold that isn't finite, or a level outside
 * (0, 1).
 */
export function performanceProfile(
  tasks: readonly ArrayLike<number>[],
  options: {
    readonly thresholds: ArrayLike<number>;
    readonly level?: number;
    readonly resamples?: number;
    readonly stream: Stream;
  },
): PerformanceProfile {
  const { level = 0.95, resamples = defaultResamples, stream } = options;
  checkShare(level, 'level');
  checkCount(resamples, 'resamples');
  checkValues(options.thresholds, 'thresholds');
  const runs = stackTasks(tasks);
  const thresholds = Array.from(options.thresholds);
  const sharesAbove = countedShares(runs, thresholds);
  const counts = new Uint32Array(runs.values.length).fill(1);
  const shares = Array.from(sharesAbove(counts));
  const replicates = thresholds.map(() => new Float64Array(resamples));
  for (let b = 0; b < resamples; b++) {
    redrawRuns(runs, counts, stream);
    sharesAbove(counts).forEach((share, j) => {
      replicates[j]![b] = share;
    });
  }
  for (const column of replicates) column.sort();
  return {
    method: 'stratified-percentile-pointwise',
    tasks: runs.tasks,
    level,
    resamples,
    thresholds,
    shares,
    low: replicates.map((column) => quantileSorted(column, (1 - level) / 2)),
    high: replicates.map((column) => quantileSorted(column, (1 + level) / 2)),
  };
}

/** The shares for runs that count as often as said; the array returned is used again by the next call. */
function countedShares(
  { values, starts, tasks }: TaskRuns,
  thresholds: readonly number[],
): (counts: Uint32Array) => Float64Array {
  const descending = orderByDescending(values);
  const weights = new Float64Array(values.length);
  for (let t = 0; t < tasks; t++) weights.fill(1 / (starts[t + 1]! - starts[t]!), starts[t], starts[t + 1]);
  const above = thresholds.map((threshold) => values.filter((value) => value > threshold).length);
  const cumulative = new Float64Array(values.length + 1);
  const shares = new Float64Array(thresholds.length);
  return (counts) => {
    descending.forEach((i, k) => {
      cumulative[k + 1] = cumulative[k]! + weights[i]! * counts[i]!;
    });
    const total = cumulative[values.length]!;
    above.forEach((count, j) => {
      shares[j] = cumulative[count]! / total;
    });
    return shares;
  };
}
