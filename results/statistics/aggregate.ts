import { orderByDescending } from '../../harness/designs.js';
import { interquartileMeanSorted } from './interquartile-mean.js';
import type { TaskRuns } from './task-runs.js';

/**
 * How the runs of all tasks become one number.
 *
 * - `mean-of-task-means`: every task counts the same, however many runs it has.
 * - `interquartile-mean`: the mean of the middle half of all runs, pooled (Agarwal et al. 2021); a task with more runs
 *   weighs more.
 */
export type Aggregate = 'mean-of-task-means' | 'interquartile-mean';

/** An aggregate of runs that each count as often as `counts` (total) says. */
export type CountedAggregate = (counts: Uint32Array) => number;

/** Prepares an aggregate of the runs, so that it can be taken of many resamples at a cost linear in their number. */
export function countedAggregate(runs: TaskRuns, aggregate: Aggregate): CountedAggregate {
  return aggregate === 'mean-of-task-means' ? meanOfTaskMeans(runs) : pooledInterquartileMean(runs);
}

function meanOfTaskMeans({ values, starts, tasks }: TaskRuns): CountedAggregate {
  return (counts) => {
    let total = 0;
    for (let t = 0; t < tasks; t++) {
      let sum = 0;
      for (let i = starts[t]!; i < starts[t + 1]!; i++) sum += counts[i]! * values[i]!;
      total += sum / (starts[t + 1]! - starts[t]!);
    }
    return total / tasks;
  };
}

function pooledInterquartileMean({ values }: TaskRuns): CountedAggregate {
  const order = Uint32Array.from(orderByDescending(values)).reverse();
  const sorted = Float64Array.from(order, (i) => values[i]!);
  return (counts) => interquartileMeanSorted(sorted, order, counts, values.length);
}
