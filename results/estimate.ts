import type { Stream } from '../harness/random.js';
import { meanInterval } from './statistics/mean-interval.js';
import { stratifiedBootstraps } from './statistics/stratified-bootstrap.js';
import { wilsonInterval } from './statistics/wilson.js';

/** Confidence of every interval in a comparison. */
export const intervalLevel = 0.95;

/**
 * How an interval was made: `transformed-t` and `student-t` are of a mean over seeds, `stratified-t` is of a mean of
 * task means, and `stratified-expanded-percentile` of an interquartile mean over tasks. `constant` says that all values are equal, so that both bounds are at the value.
 */
export type IntervalMethod =
  | 'transformed-t'
  | 'student-t'
  | 'constant'
  | 'stratified-t'
  | 'stratified-expanded-percentile';

/** An interval, with what made it. */
export interface Interval {
  readonly low: number;
  readonly high: number;
  readonly level: number;
  readonly method: IntervalMethod;
}

/** A mean or another aggregate of n cells. */
export interface Estimate {
  readonly value: number;
  /** Cells that it was made of. */
  readonly n: number;
  /** Absent (null) where one value is no ground for an interval. */
  readonly interval: Interval | null;
}

/** What gathers a score, task after task. */
export interface Collector {
  /** Takes a task's scores. */
  add(values: readonly number[]): void;
}

/** A share of trials with Wilson's interval. */
export interface ShareEstimate {
  readonly successes: number;
  readonly trials: number;
  readonly share: number;
  readonly low: number;
  readonly high: number;
  readonly level: number;
}

/**
 * Mean of one score over cells, (n) with n ≥ 1, and its 95 % interval: by Hall's transformation from
 * 8 cells on, Student's t below, none for one cell.
 *
 * @param total collects the score over all tasks, where there are several.
 * @throws RangeError for no values or one that isn't finite.
 */
export function estimateMean(values: readonly number[], total?: Collector): Estimate {
  total?.add(values);
  const found = meanInterval(values, { level: intervalLevel });
  const { mean: value, n, level, method } = found;
  if (method === 'none') return { value, n, interval: null };
  return { value, n, interval: { low: found.low, high: found.high, level, method } };
}

/** The share of cells for which something holds, with its 95 % interval (Wilson 1927). */
export function estimateShare<T>(cells: readonly T[], holds: (cell: T) => boolean): ShareEstimate {
  const { successes, trials, share, low, high, level } = wilsonInterval({
    successes: cells.filter(holds).length,
    trials: cells.length,
    level: intervalLevel,
  });
  return { successes, trials, share, low, high, level };
}

/**
 * Interquartile means of one score over all cells, for several methods, with 95 % intervals by the bootstrap over seeds
 * within tasks (Agarwal et al. 2021), as expanded percentiles (Hesterberg 2015). There is no interval when a task has a single cell: redrawing it would pretend
 * that its score is certain.
 *
 * @param methods for each method its tasks, and for each task its scores.
 * @throws RangeError for no tasks, a task without a cell, or a score that isn't finite.
 */
export function estimateInterquartileMeans(
  methods: readonly (readonly (readonly number[])[])[],
  options: { readonly resamples: number; readonly stream: Stream },
): Estimate[] {
  const found = stratifiedBootstraps(methods, {
    aggregate: 'interquartile-mean',
    level: intervalLevel,
    expanded: true,
    ...options,
  });
  return found.map(({ estimate, low, high, level, runs }, i) => {
    const tasks = methods[i]!;
    if (tasks.some((cells) => cells.length < 2)) return { value: estimate, n: runs, interval: null };
    const constant = tasks.every((cells) => cells.every((score) => score === cells[0]));
    const method = constant ? 'constant' : 'stratified-expanded-percentile';
    return { value: estimate, n: runs, interval: { low, high, level, method } };
  });
}
