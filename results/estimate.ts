import type { Stream } from '../harness/random.js';
import type { Aggregate } from './statistics/aggregate.js';
import { meanInterval } from './statistics/mean-interval.js';
import { stratifiedBootstrap } from './statistics/stratified-bootstrap.js';

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

/** How the bootstraps of an estimate are carried out. */
export interface EstimateOptions {
  readonly resamples: number;
  readonly stream: Stream;
}

/**
 * Mean of one score over cells, (n) with n ≥ 1, and its 95 % interval: BCa from 8 cells on, Student's t below, none
 * for one cell.
 *
 * @throws RangeError for no values or one that isn't finite.
 */
export function estimateMean(values: readonly number[], options: EstimateOptions): Estimate {
  const found = meanInterval(values, { level: intervalLevel, ...options });
  const { mean: value, n, level, method } = found;
  if (method === 'none') return { value, n, interval: null };
  return { value, n, interval: { low: found.low, high: found.high, level, method } };
}

/**
 * Aggregate of one score over tasks, one array of cells a task, and its 95 % interval by the bootstrap over seeds
 * within tasks (Agarwal et al. 2021). There is no interval when a task has a single cell: redrawing it would pretend
 * that its score is certain.
 *
 * @throws RangeError for no tasks, a task without a cell, or a score that isn't finite.
 */
export function estimateOverTasks(
  tasks: readonly (readonly number[])[],
  aggregate: Aggregate,
  options: EstimateOptions,
): Estimate {
  const { estimate, low, high, level, runs, method } = stratifiedBootstrap(tasks, {
    aggregate,
    level: intervalLevel,
    ...options,
  });
  if (tasks.some((cells) => cells.length < 2)) return { value: estimate, n: runs, interval: null };
  const constant = tasks.every((cells) => cells.every((score) => score === cells[0]));
  return { value: estimate, n: runs, interval: { low, high, level, method: constant ? 'constant' : method } };
}
