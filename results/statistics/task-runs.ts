import type { Stream } from '../../harness/random.js';
import { checkCount, checkValues } from './check-values.js';

/** The scores of one method, task under task: task t holds `values[starts[t]]` … `values[starts[t + 1] − 1]`. */
export interface TaskRuns {
  /** All runs, (total). */
  readonly values: Float64Array;
  /** Where each task starts, and at the end the total, (tasks + 1). */
  readonly starts: Uint32Array;
  readonly tasks: number;
}

/**
 * Puts the runs of each task, one score a seed, under one another. Tasks may differ in their number of runs.
 *
 * @throws RangeError for no task, a task without a run, or a score that isn't finite.
 */
export function stackTasks(tasks: readonly ArrayLike<number>[]): TaskRuns {
  checkCount(tasks.length, 'number of tasks');
  const starts = new Uint32Array(tasks.length + 1);
  tasks.forEach((runs, t) => {
    checkValues(runs, `runs of task ${t}`);
    starts[t + 1] = starts[t]! + runs.length;
  });
  const values = new Float64Array(starts[tasks.length]!);
  tasks.forEach((runs, t) => {
    values.set(Array.from(runs), starts[t]);
  });
  return { values, starts, tasks: tasks.length };
}

/**
 * Redraws the runs of every task with replacement, as many as it has, and writes into `counts` (total) how often each
 * run was drawn: the stratified resampling of Agarwal et al. 2021.
 */
export function redrawRuns({ starts, tasks }: TaskRuns, counts: Uint32Array, stream: Stream): void {
  counts.fill(0);
  for (let t = 0; t < tasks; t++) {
    const start = starts[t]!;
    const runs = starts[t + 1]! - start;
    for (let i = 0; i < runs; i++) counts[start + Math.floor(stream.uniform() * runs)]!++;
  }
}

/** Whether two methods have the same number of runs in every task, so that their runs can be paired by seed. */
export function haveEqualShape(a: TaskRuns, b: TaskRuns): boolean {
  return a.tasks === b.tasks && a.starts.every((start, t) => start === b.starts[t]);
}
