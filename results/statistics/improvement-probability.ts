import { orderByDescending } from '../../harness/designs.js';
import type { Stream } from '../../harness/random.js';
import { percentileInterval } from './stratified-bootstrap.js';
import { haveEqualShape, redrawRuns, stackTasks, type TaskRuns } from './task-runs.js';

/** How probably one method beats another on a task taken at random. */
export interface ImprovementProbability {
  readonly method: 'stratified-percentile';
  /** Mean over tasks of P(candidate > reference) + ½ P(candidate = reference). */
  readonly estimate: number;
  readonly tasks: number;
  readonly level: number;
  readonly resamples: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Probability of improvement (Agarwal et al. 2021): in each task the share of pairs of runs in which the
 * candidate scores higher, ties counting half (Mann & Whitney 1947), averaged over tasks; with a percentile interval
 * from runs redrawn within tasks. It tells how often, and not by how much.
 *
 * @param candidate one array of scores a task, one score a seed.
 * @param reference the same tasks in the same order; numbers of runs may differ unless paired.
 * @param options.paired whether run i of a task had the same seed in both methods, and is redrawn for both together.
 * @throws RangeError for no task, a task without a run, a score that isn't finite, methods that differ in their tasks
 * or, when paired, in runs.
 */
export function improvementProbability(
  candidate: readonly ArrayLike<number>[],
  reference: readonly ArrayLike<number>[],
  options: {
    readonly paired: boolean;
    readonly level?: number;
    readonly resamples?: number;
    readonly stream: Stream;
  },
): ImprovementProbability {
  const ours = stackTasks(candidate);
  const theirs = stackTasks(reference);
  if (ours.tasks !== theirs.tasks)
    throw new RangeError(`cannot compare ${ours.tasks} tasks with ${theirs.tasks}`);
  if (options.paired && !haveEqualShape(ours, theirs))
    throw new RangeError('paired runs need the same number of runs in every task for both methods');
  const probability = countedProbability(ours, theirs);
  const ourCounts = new Uint32Array(ours.values.length);
  const theirCounts = options.paired ? ourCounts : new Uint32Array(theirs.values.length);
  const interval = percentileInterval(options, () => {
    redrawRuns(ours, ourCounts, options.stream);
    if (!options.paired) redrawRuns(theirs, theirCounts, options.stream);
    return probability(ourCounts, theirCounts);
  });
  const estimate = probability(ourCounts.fill(1), theirCounts.fill(1));
  return { method: 'stratified-percentile', estimate, tasks: ours.tasks, ...interval };
}

type CountedProbability = (ourCounts: Uint32Array, theirCounts: Uint32Array) => number;

/** The estimate for runs that count as often as said, at a cost linear in their number. */
function countedProbability(ours: TaskRuns, theirs: TaskRuns): CountedProbability {
  const perTask = Array.from({ length: ours.tasks }, (_, t) => countedWins(ours, theirs, t));
  return (ourCounts, theirCounts) =>
    perTask.reduce((sum, wins) => sum + wins(ourCounts, theirCounts), 0) / perTask.length;
}

function countedWins(ours: TaskRuns, theirs: TaskRuns, task: number): CountedProbability {
  const [ourStart, ourEnd] = [ours.starts[task]!, ours.starts[task + 1]!];
  const [theirStart, theirEnd] = [theirs.starts[task]!, theirs.starts[task + 1]!];
  const theirScores = theirs.values.subarray(theirStart, theirEnd);
  const ascending = Uint32Array.from(orderByDescending(theirScores).reverse(), (i) => theirStart + i);
  const ourScores = ours.values.subarray(ourStart, ourEnd);
  const beaten = Uint32Array.from(ourScores, (score) => theirScores.filter((other) => other < score).length);
  const reached = Uint32Array.from(
    ourScores,
    (score) => theirScores.filter((other) => other <= score).length,
  );
  const countBelow = new Float64Array(ascending.length + 1);
  return (ourCounts, theirCounts) => {
    for (let k = 0; k < ascending.length; k++)
      countBelow[k + 1] = countBelow[k]! + theirCounts[ascending[k]!]!;
    let wins = 0;
    for (let i = 0; i < beaten.length; i++)
      wins += (ourCounts[ourStart + i]! * (countBelow[beaten[i]!]! + countBelow[reached[i]!]!)) / 2;
    return wins / (beaten.length * ascending.length);
  };
}
