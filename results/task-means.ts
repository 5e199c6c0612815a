import { type Collector, type Estimate, intervalLevel } from './estimate.js';
import { meanInterval } from './statistics/mean-interval.js';
import { stratifiedInterval } from './statistics/stratified-interval.js';
import { stratifiedMean } from './statistics/stratified-mean.js';

/**
 * Collects one score of one method, task after task, and gives the mean of the tasks' means with its 95 % interval: t
 * with Satterthwaite's degrees of freedom. With scores of a single task the interval is that of the task.
 */
export class TaskMeans implements Collector {
  readonly #tasks: (readonly number[])[] = [];

  /** Adds a task's scores, (n) with n ≥ 1. */
  add(values: readonly number[]): void {
    this.#tasks.push(values);
  }

  /** No interval when a task has a single cell, which tells nothing of its spread. */
  estimate(): Estimate {
    const { mean: value, n } = stratifiedMean(this.#tasks);
    return { value, n, interval: this.#interval() };
  }

  #interval(): Estimate['interval'] {
    const [only, ...others] = this.#tasks;
    if (only === undefined || others.length > 0)
      return stratifiedInterval(this.#tasks, { level: intervalLevel });
    const { level, ...found } = meanInterval(only, { level: intervalLevel });
    return found.method === 'none' ? null : { low: found.low, high: found.high, level, method: found.method };
  }
}
