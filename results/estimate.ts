import type { Stream } from '../harness/random.js';
import { meanInterval } from './statistics/mean-interval.js';
import type { Resampler } from './statistics/resampler.js';
import { stratifiedBootstraps } from './statistics/stratified-bootstrap.js';
import { wilsonInterval } from './statistics/wilson.js';

/** Confidence of every interval in a comparison. */
export const intervalLevel = 0.95;

/**
 * How an interval was made: `bca` and `student-t` are of a mean over seeds, `stratified-percentile` and `stratified-t`
 * are of an aggregate over tasks. `constant` says that all values are equal, so that both bounds are at the value.
 */
export type IntervalMethod = 'bca' | 'student-t' | 'constant' | 'stratified-percentile' | 'stratified-t';

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
  /** Takes a task's scores; `replicates` gives the means of their resamples, minus their mean. */
  add(values: readonly number[], replicates: () => Float64Array): void;
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
 * Mean of one score over cells, (n) with n ≥ 1, and its 95 % interval: BCa from 8 cells on, Student's t below, none
 * for one cell.
 *
 * @param total collects the score over all tasks, where there are several.
 * @throws RangeError for no values or one that isn't finite.
 */
export function estimateMean(values: readonly number[], resampler: Resampler, total?: Collector): Estimate {
  let drawn: Float64Array | undefined;
  const replicates = (): Float64Array => {
    drawn ??= resampler.meanDeviations(values);
    return drawn;
  };
  total?.add(values, replicates);
  const found = meanInterval(values, { level: intervalLevel, replicates });
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
 * within tasks (Agarwal et al. 2021). There is no interval when a task has a single cell: redrawing it would pretend
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
    ...options,
  });
  return found.map(({ estimate, low, high, level, runs, method }, i) => {
    const tasks = methods[i]!;
    if (tasks.some((cells) => cells.length < 2)) return { value: estimate, n: runs, interval: null };
    const constant = tasks.every((cells) => cells.every((score) => score === cells[0]));
    return {
      value: estimate,
      n: runs,
      interval: { low, high, level, method: constant ? 'constant' : method },
    };
  });
}
