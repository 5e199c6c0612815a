import type { Stream } from '../../harness/random.js';
import { type Aggregate, countedAggregate } from './aggregate.js';
import { defaultResamples } from './bca.js';
import { checkCount, checkShare } from './check-values.js';
import { expandedLevel } from './expanded-level.js';
import { quantileSorted } from './quantile.js';
import { haveEqualShape, redrawRuns, stackTasks, type TaskRuns } from './task-runs.js';

/** How a stratified bootstrap is carried out. */
export interface StratifiedOptions {
  readonly aggregate: Aggregate;
  /** Confidence, in (0, 1); 0.95 unless given. */
  readonly level?: number;
  /** Resamples drawn; 10,000 unless given. */
  readonly resamples?: number;
  /** Whether the interval is widened as `expandedLevel` says; not unless given. */
  readonly expanded?: boolean;
  readonly stream: Stream;
}

/** An aggregate over tasks with its percentile interval. */
export interface StratifiedInterval {
  readonly method: 'stratified-percentile' | 'stratified-expanded-percentile';
  readonly aggregate: Aggregate;
  /** The aggregate of the runs themselves. */
  readonly estimate: number;
  readonly level: number;
  readonly resamples: number;
  readonly tasks: number;
  /** Runs of all tasks together; of the smaller method where two are compared. */
  readonly runs: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Percentile interval of an aggregate over tasks: runs are redrawn with replacement within each task, and tasks stay
 * as they are (Agarwal et al. 2021). It tells how other seeds on the same tasks would have come out, and
 * nothing of other tasks. With one run in every task it has no width.
 *
 * @param tasks one array of scores a task, one score a seed; tasks may differ in their number of runs.
 * @throws RangeError for no task, a task without a run, a score that isn't finite, or a level outside (0, 1).
 */
export function stratifiedBootstrap(
  tasks: readonly ArrayLike<number>[],
  options: StratifiedOptions,
): StratifiedInterval {
  return bootstrapTogether([stackTasks(tasks)], options)[0]!;
}

/**
 * `stratifiedBootstrap` of several methods. Methods with the same numbers of runs are given the same redrawn runs, so
 * that the random numbers are drawn once, and methods with the same scores have the same interval.
 *
 * @param methods for each method its tasks, as for `stratifiedBootstrap`.
 */
export function stratifiedBootstraps(
  methods: readonly (readonly ArrayLike<number>[])[],
  options: StratifiedOptions,
): StratifiedInterval[] {
  const stacked = methods.map(stackTasks);
  const shapes = new Map<string, TaskRuns[]>();
  for (const runs of stacked) {
    const shape = runs.starts.join();
    shapes.set(shape, [...(shapes.get(shape) ?? []), runs]);
  }
  const found = new Map<TaskRuns, StratifiedInterval>();
  for (const alike of shapes.values()) {
    const stream = options.stream.split('runs drawn');
    const intervals = bootstrapTogether(alike, { ...options, stream });
    for (const [i, runs] of alike.entries()) found.set(runs, intervals[i]!);
  }
  return stacked.map((runs) => found.get(runs)!);
}

/** The intervals of methods with the same numbers of runs. */
function bootstrapTogether(methods: readonly TaskRuns[], options: StratifiedOptions): StratifiedInterval[] {
  const { level = 0.95, resamples = defaultResamples, expanded = false, stream } = options;
  checkShare(level, 'level');
  checkCount(resamples, 'resamples');
  const aggregates = methods.map((runs) => countedAggregate(runs, options.aggregate));
  const replicates = methods.map(() => new Float64Array(resamples));
  const [shape] = methods;
  const counts = new Uint32Array(shape!.values.length);
  for (let b = 0; b < resamples; b++) {
    redrawRuns(shape!, counts, stream);
    for (let m = 0; m < methods.length; m++) replicates[m]![b] = aggregates[m]!(counts);
  }
  counts.fill(1);
  const widened = expanded && counts.length > shape!.tasks;
  const taken = widened ? expandedLevel(level, { values: counts.length, tasks: shape!.tasks }) : level;
  return methods.map((runs, m) => ({
    method: widened ? 'stratified-expanded-percentile' : 'stratified-percentile',
    aggregate: options.aggregate,
    estimate: aggregates[m]!(counts),
    tasks: runs.tasks,
    runs: counts.length,
    ...percentiles(replicates[m]!, taken),
    level,
  }));
}

/**
 * Percentile interval of the aggregate of `candidate` minus that of `reference`, over the same tasks.
 *
 * @param options.paired whether run i of a task had the same seed in both methods. Then the same runs are redrawn for
 * both, so that what the seed decides for both cancels; otherwise each method's runs are redrawn on their own.
 * @throws RangeError as `stratifiedBootstrap`, and for methods that differ in their tasks or, when paired, in runs.
 */
export function stratifiedBootstrapDifference(
  candidate: readonly ArrayLike<number>[],
  reference: readonly ArrayLike<number>[],
  options: StratifiedOptions & { readonly paired: boolean },
): StratifiedInterval {
  const ours = stackTasks(candidate);
  const theirs = stackTasks(reference);
  if (ours.tasks !== theirs.tasks)
    throw new RangeError(`cannot compare ${ours.tasks} tasks with ${theirs.tasks}`);
  if (options.paired && !haveEqualShape(ours, theirs))
    throw new RangeError('paired runs need the same number of runs in every task for both methods');
  const ourAggregate = countedAggregate(ours, options.aggregate);
  const theirAggregate = countedAggregate(theirs, options.aggregate);
  const ourCounts = new Uint32Array(ours.values.length);
  const theirCounts = options.paired ? ourCounts : new Uint32Array(theirs.values.length);
  const interval = percentileInterval(options, () => {
    redrawRuns(ours, ourCounts, options.stream);
    if (!options.paired) redrawRuns(theirs, theirCounts, options.stream);
    return ourAggregate(ourCounts) - theirAggregate(theirCounts);
  });
  return {
    method: 'stratified-percentile',
    aggregate: options.aggregate,
    estimate: ourAggregate(ourCounts.fill(1)) - theirAggregate(theirCounts.fill(1)),
    tasks: ours.tasks,
    runs: Math.min(ourCounts.length, theirCounts.length),
    ...interval,
  };
}

/** The part of a percentile interval that its replicates decide; `draw` gives one replicate a call. */
export function percentileInterval(
  options: { readonly level?: number; readonly resamples?: number },
  draw: () => number,
): { readonly level: number; readonly resamples: number; readonly low: number; readonly high: number } {
  const { level = 0.95, resamples = defaultResamples } = options;
  checkShare(level, 'level');
  checkCount(resamples, 'resamples');
  const replicates = new Float64Array(resamples);
  for (let b = 0; b < resamples; b++) replicates[b] = draw();
  return percentiles(replicates, level);
}

/** The percentile interval of replicates, which are put into order. */
export function percentiles(
  replicates: Float64Array,
  level: number,
): { readonly level: number; readonly resamples: number; readonly low: number; readonly high: number } {
  replicates.sort();
  const low = quantileSorted(replicates, (1 - level) / 2);
  const high = quantileSorted(replicates, (1 + level) / 2);
  return { level, resamples: replicates.length, low, high };
}
