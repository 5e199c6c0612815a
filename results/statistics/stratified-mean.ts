import { checkCount } from './check-values.js';
import { moments } from './moments.js';

/** The mean of task means, and how far it can be trusted. */
export interface StratifiedMean {
  readonly tasks: number;
  /** Values of all tasks together. */
  readonly n: number;
  /** Mean of the tasks' means; every task weighs the same. */
  readonly mean: number;
  /** √(Σ s²/n) / tasks over the tasks' own deviations s and counts n; absent where a task has a single value. */
  readonly standardError?: number;
  /** Satterthwaite's; n − 1 for one task; absent with the standard error, and where that is 0. */
  readonly degreesOfFreedom?: number;
  /**
   * Deviation of one value as it bears on the mean: with n values in each task the standard error is this over
   * √(n · tasks). The root mean square of the tasks' deviations; for one task its own.
   */
  readonly standardDeviation?: number;
}

/**
 * Mean of task means with its standard error and Satterthwaite's degrees of freedom,
 * (Σ v)² / Σ v²/(n − 1) with v = s²/n of each task (Satterthwaite 1946). For one task these are the plain mean,
 * standard error and n − 1.
 *
 * @param tasks one array of values a task, each with at least one; lengths may differ.
 * @throws RangeError for no task, a task without a value, or a value that isn't finite.
 */
export function stratifiedMean(tasks: readonly ArrayLike<number>[]): StratifiedMean {
  checkCount(tasks.length, 'number of tasks');
  const each = tasks.map((values) => moments(values));
  const n = each.reduce((sum, task) => sum + task.n, 0);
  const mean =
    each.length === 1 ? each[0]!.mean : each.reduce((sum, task) => sum + task.mean, 0) / each.length;
  if (each.some((task) => task.standardDeviation === undefined)) return { tasks: each.length, n, mean };
  const spread = each.map((task) => ({ n: task.n, variance: task.standardError! ** 2 }));
  const total = spread.reduce((sum, { variance }) => sum + variance, 0);
  const squares = each.reduce((sum, task) => sum + task.standardDeviation! ** 2, 0);
  const known = {
    tasks: each.length,
    n,
    mean,
    standardError: Math.sqrt(total) / each.length,
    standardDeviation: Math.sqrt(squares / each.length),
  };
  if (total === 0) return known;
  const uncertainty = spread.reduce((sum, task) => sum + (task.variance / total) ** 2 / (task.n - 1), 0);
  return { ...known, degreesOfFreedom: 1 / uncertainty };
}
