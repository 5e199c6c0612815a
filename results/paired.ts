import type { Stream } from '../harness/random.js';
import type { CellRow } from '../harness/row.js';
import { type Interval, intervalLevel } from './estimate.js';
import { testWithin } from './statistics/equivalence.js';
import { type SignFlipTest, type SignPatterns, signFlipTest } from './statistics/sign-flip.js';
import { stratifiedInterval } from './statistics/stratified-interval.js';
import { type StratifiedMean, stratifiedMean } from './statistics/stratified-mean.js';

/** What of a cell two methods can be compared by. */
export const pairedScores = ['best', 'median', 'lift'] as const;

export type PairedScore = (typeof pairedScores)[number];

/** The margin of a real difference, in normalized score, unless given. */
export const defaultMargin = 0.02;

/** Two methods on one task behind one curtain, seed by seed. */
export interface TaskPairs {
  readonly task: string;
  readonly curtain: string;
  /** Seeds that both have, ascending, (n) with n ≥ 1. */
  readonly seeds: readonly number[];
  /** Score minus the reference's, (n), in the order of seeds. */
  readonly differences: readonly number[];
  /** Seeds that only one of the two has. */
  readonly unpaired: number;
}

/** What paired differences say. */
export interface DifferenceTest {
  readonly tasks: number;
  /** Pairs of all tasks together. */
  readonly n: number;
  /** Mean difference; over several tasks the mean of the tasks' means. */
  readonly mean: number;
  /** Of one difference; over several tasks the root mean square of the tasks' deviations. Null with a single pair. */
  readonly standardDeviation: number | null;
  /** Null where a task has a single pair. */
  readonly interval: Interval | null;
  /** Two-sided sign-flip test of a mean difference of zero. */
  readonly p: number;
  readonly test: SignFlipTest['method'];
  /** Standard error of p from drawing sign patterns; 0 where all were counted. */
  readonly monteCarloStandardError: number;
  /** Two one-sided tests: p against a mean difference at or outside ±margin. 1 where a task has a single pair. */
  readonly equivalenceP: number;
  /** The lower of the two: p against a mean difference of −margin or less. 1 where a task has a single pair. */
  readonly nonInferiorityP: number;
}

/** How differences are tested. */
export interface DifferenceOptions {
  /** Largest difference without practical meaning, above 0. */
  readonly margin: number;
  /** Confidence of the interval; 0.95 unless given. */
  readonly level?: number;
  readonly stream: Stream;
  /** Sign patterns that tests share, instead of drawing for each from the stream. */
  readonly patterns?: SignPatterns;
}

/** How often a method won, tied or lost by more than a margin. */
export interface Outcomes {
  readonly wins: number;
  readonly ties: number;
  readonly losses: number;
}

/**
 * Differences of two sets of rows, of one method each, by task, curtain and seed, in the order in which the candidate's
 * tasks come. Tasks where they share no seed are left out.
 *
 * @throws RangeError when one side holds two rows for the same task, curtain and seed.
 */
export function pairRows(
  candidate: readonly CellRow[],
  reference: readonly CellRow[],
  score: PairedScore,
): TaskPairs[] {
  const ours = groupByTask(candidate);
  const theirs = groupByTask(reference);
  return [...ours].flatMap(([place, mine]) => {
    const other = theirs.get(place) ?? new Map<number, CellRow>();
    const seeds = [...mine.keys()].filter((seed) => other.has(seed)).sort((a, b) => a - b);
    if (seeds.length === 0) return [];
    const { task, curtain } = mine.get(seeds[0]!)!;
    const differences = seeds.map((seed) => mine.get(seed)![score] - other.get(seed)![score]);
    return [{ task, curtain, seeds, differences, unpaired: mine.size + other.size - 2 * seeds.length }];
  });
}

/**
 * Paired differences of several tasks, each task weighing the same. The sign-flip test flips every pair of every task,
 * and its statistic is the mean of task means; interval and equivalence use the standard error of that mean with
 * Satterthwaite's degrees of freedom. Where all differences of each task are equal, no deviation can be told, and
 * equivalence falls back on the sign test: p is 2^−n where the mean lies within the margin, else 1.
 *
 * @param tasks differences, one array a task, each with at least one.
 * @throws RangeError for no task, a task without a pair, a difference that isn't finite, or a margin that isn't above 0.
 */
export function testTaskDifferences(
  tasks: readonly (readonly number[])[],
  { margin, level = intervalLevel, stream, patterns }: DifferenceOptions,
): DifferenceTest {
  if (!(margin > 0 && Number.isFinite(margin))) throw new RangeError(`margin must be above 0, got ${margin}`);
  const about = stratifiedMean(tasks);
  const weighted = tasks.flatMap((pairs) => pairs.map((pair) => pair / (tasks.length * pairs.length)));
  const flips = signFlipTest(weighted, patterns ? { patterns } : { stream: stream.split('sign flips') });
  return {
    tasks: about.tasks,
    n: about.n,
    mean: about.mean,
    standardDeviation: about.standardDeviation ?? null,
    interval: stratifiedInterval(tasks, { level }),
    p: flips.p,
    test: flips.method,
    monteCarloStandardError: flips.method === 'sign-flip-drawn' ? flips.monteCarloStandardError : 0,
    ...testAgainstMargin(about, margin),
  };
}

/** Counts pairs above the margin, within it, and below minus the margin. */
export function countOutcomes(differences: readonly number[], margin: number): Outcomes {
  const wins = differences.filter((difference) => difference > margin).length;
  const losses = differences.filter((difference) => difference < -margin).length;
  return { wins, ties: differences.length - wins - losses, losses };
}

function testAgainstMargin(
  { mean, n, standardError, degreesOfFreedom }: StratifiedMean,
  margin: number,
): Pick<DifferenceTest, 'equivalenceP' | 'nonInferiorityP'> {
  if (standardError === undefined) return { equivalenceP: 1, nonInferiorityP: 1 };
  if (degreesOfFreedom === undefined) {
    const all = 2 ** -n;
    return { equivalenceP: Math.abs(mean) < margin ? all : 1, nonInferiorityP: mean > -margin ? all : 1 };
  }
  const { lower, p } = testWithin(margin, { mean, standardError, degreesOfFreedom });
  return { equivalenceP: p, nonInferiorityP: lower.p };
}

function groupByTask(rows: readonly CellRow[]): Map<string, Map<number, CellRow>> {
  const groups = new Map<string, Map<number, CellRow>>();
  for (const row of rows) {
    const place = JSON.stringify([row.task, row.curtain]);
    const group = groups.get(place) ?? new Map<number, CellRow>();
    if (group.has(row.seed))
      throw new RangeError(`two rows of ${row.method} for seed ${row.seed} of ${row.task}`);
    groups.set(place, group.set(row.seed, row));
  }
  return groups;
}
