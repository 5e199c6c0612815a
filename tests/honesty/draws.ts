import { type Stream, sampleWithout } from '../../harness/random.js';
import { moments } from '../../results/statistics/moments.js';
import type { TaskScores } from './score-table.js';

/** The method that the others are held against. */
export const reference = 'repeat-best';

/** What a method's scores would be, could one go on with seeds for ever: each seed with each stream, alike likely. */
export function scoresOf({ methods }: TaskScores, method: string): Float64Array {
  const streams = methods.get(method);
  if (streams === undefined) throw new RangeError(`no scores of ${method}`);
  return Float64Array.from(streams.slice(0, 2).flatMap((scores) => [...scores]));
}

/** Differences of a method to the reference, seed by seed, for each stream. */
export const differencesOf: (task: TaskScores, method: string) => Float64Array = keep((task, method) => {
  const theirs = scoresOf(task, reference);
  return scoresOf(task, method).map((score, i) => score - theirs[i]!);
});

/** The same, moved to a mean of 0. */
export const centredDifferencesOf: (task: TaskScores, method: string) => Float64Array = keep((task, method) =>
  moveTo(differencesOf(task, method), 0),
);

/** Differences of a method to itself with other random numbers, (seeds). */
export function rerunDifferences({ methods }: TaskScores, method: string): Float64Array {
  const [first, second] = methods.get(method) ?? [];
  return first!.map((score, seed) => second![seed]! - score);
}

/** The values moved so that their mean is `mean`. */
export function moveTo(values: Float64Array, mean: number): Float64Array {
  const by = mean - moments(values).mean;
  return values.map((value) => value + by);
}

/** Positions of n draws with replacement. */
export function drawPositions(n: number, limit: number, stream: Stream): number[] {
  return Array.from({ length: n }, () => stream.below(limit));
}

/** The values at the positions. */
export function pick(values: ArrayLike<number>, positions: readonly number[]): number[] {
  return positions.map((position) => values[position]!);
}

/**
 * A method against copies of itself that had other random numbers: n seeds drawn with replacement, and for each seed its
 * streams dealt out anew, one to the reference and one to each copy. No copy is better than another.
 *
 * @returns differences, (copies, n).
 */
export function drawCopies(
  { methods, seeds }: TaskScores,
  method: string,
  { copies, n, stream }: { readonly copies: number; readonly n: number; readonly stream: Stream },
): number[][] {
  const streams = methods.get(method) ?? [];
  if (streams.length <= copies)
    throw new RangeError(`${method} has scores of ${streams.length} streams only`);
  const differences = Array.from({ length: copies }, () => new Array<number>(n).fill(0));
  for (let i = 0; i < n; i++) {
    const seed = stream.below(seeds);
    const [own, ...others] = sampleWithout(stream, streams.length, copies + 1);
    others.forEach((other, copy) => {
      differences[copy]![i] = streams[other]![seed]! - streams[own!]![seed]!;
    });
  }
  return differences;
}

/** Methods whose difference to the reference is not the same for all seeds. */
export function scatteredMethods(task: TaskScores): string[] {
  return [...task.methods.keys()].filter((method) => {
    const [first, ...others] = differencesOf(task, method);
    return method !== reference && others.some((difference) => difference !== first);
  });
}

/** Works each answer out once; a study asks for the same again and again. */
function keep<Answer>(
  work: (task: TaskScores, method: string) => Answer,
): (task: TaskScores, method: string) => Answer {
  const answers = new WeakMap<TaskScores, Map<string, Answer>>();
  return (task, method) => {
    const known = answers.get(task) ?? new Map<string, Answer>();
    answers.set(task, known);
    const answer = known.get(method) ?? work(task, method);
    known.set(method, answer);
    return answer;
  };
}

/** Skewness of values: third central moment over the 1.5th power of the second, both with divisor n. */
export function skewnessOf(values: ArrayLike<number>): number {
  const { n, mean } = moments(values);
  const central = (power: number) =>
    Array.from(values).reduce((sum, value) => sum + (value - mean) ** power, 0) / n;
  return central(3) / central(2) ** 1.5;
}
