import { type Collector, type Estimate, intervalLevel } from './estimate.js';
import { moments } from './statistics/moments.js';
import { percentiles } from './statistics/stratified-bootstrap.js';

/**
 * Collects one score of one method, task after task, and gives the mean of the tasks' means with its 95 % interval by
 * the bootstrap over seeds within tasks (Agarwal et al. 2021): as tasks are redrawn on their own, a resample of all
 * tasks is one of each, and the tasks' own replicates are used again.
 */
export class TaskMeans implements Collector {
  #tasks = 0;
  #cells = 0;
  #sum = 0;
  #hasSingle = false;
  #deviations: Float64Array | undefined;

  /** Adds a task's scores, (n) with n ≥ 1; `replicates` gives the means of their resamples, minus their mean. */
  add(values: readonly number[], replicates: () => Float64Array): void {
    const { n, mean, standardDeviation } = moments(values);
    this.#tasks += 1;
    this.#cells += n;
    this.#sum += mean;
    if (standardDeviation === undefined) this.#hasSingle = true;
    if (standardDeviation === undefined || standardDeviation === 0) return;
    const added = replicates();
    this.#deviations ??= new Float64Array(added.length);
    for (let b = 0; b < added.length; b++) this.#deviations[b]! += added[b]!;
  }

  /** No interval when a task has a single cell: redrawing it would pretend that its score is certain. */
  estimate(): Estimate {
    const value = this.#sum / this.#tasks;
    const n = this.#cells;
    if (this.#hasSingle) return { value, n, interval: null };
    if (this.#deviations === undefined)
      return { value, n, interval: { low: value, high: value, level: intervalLevel, method: 'constant' } };
    const replicates = this.#deviations.map((sum) => value + sum / this.#tasks);
    const { low, high, level } = percentiles(replicates, intervalLevel);
    return { value, n, interval: { low, high, level, method: 'stratified-percentile' } };
  }
}
