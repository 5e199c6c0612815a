import { OnebatchError } from '../harness/errors.js';
import { suggestion } from '../harness/nearest-word.js';
import type { Stream } from '../harness/random.js';
import { decideAtLooks, type Looks } from './decide-at-looks.js';
import type { Estimate } from './estimate.js';
import {
  countOutcomes,
  type DifferenceTest,
  type Outcomes,
  type PairedScore,
  pairRows,
  type TaskPairs,
  testTaskDifferences,
} from './paired.js';
import type { MethodCells, SectionCells } from './scores.js';
import { SignPatterns } from './statistics/sign-flip.js';
import { adjustAndDecide, type Decision } from './verdict.js';

/** The method that is the reference where a ledger holds it, and nobody asks for another. */
const usualReference = 'repeat-best';

/** What methods are held against, and how. */
export interface Against {
  /** Label of the reference. */
  readonly method: string;
  readonly score: PairedScore;
  /** Largest difference without practical meaning. */
  readonly margin: number;
  /** Family-wise level of the verdicts of a table. */
  readonly alpha: number;
  /** Where seeds were added until verdicts were reached: when these were looked at; null where their number was fixed. */
  readonly looks: Looks | null;
}

/** One method against the reference. */
export interface AgainstReference extends Decision, Outcomes {
  readonly method: string;
  readonly settings: string;
  /** Pairs of task and curtain on which both have a seed in common. */
  readonly tasks: number;
  /** Pairs of cells; over all tasks those of all. */
  readonly pairs: number;
  /** Cells of either method that have no partner. */
  readonly unpaired: number;
  /** Mean of score minus the reference's; over all tasks the mean of the tasks' means. */
  readonly difference: Estimate;
  /** Standard deviation of the differences; null for a single pair. */
  readonly standardDeviation: number | null;
  /** Two-sided sign-flip p of no difference, before Holm's adjustment. */
  readonly p: number;
  readonly test: DifferenceTest['test'];
  /** Standard error of p from drawing sign patterns; 0 where all were counted. */
  readonly monteCarloStandardError: number;
  /** p of the two one-sided tests within ±margin, before Holm's adjustment. */
  readonly equivalenceP: number;
  /** The look, from 1 on, at which the verdict was reached; null where it was not, or nobody looked before the end. */
  readonly look: number | null;
}

/** All methods of a table against its reference. */
export interface ReferenceBlock extends Against {
  /** From the largest difference to the smallest. */
  readonly methods: readonly AgainstReference[];
}

/**
 * The label of the reference: the one asked for, else `repeat-best` where the ledger holds it, else the first method.
 *
 * @throws OnebatchError (`bad-input`) for a method that the ledger does not hold.
 */
export function chooseReference(sections: readonly SectionCells[], asked: string | undefined): string {
  const labels = [...new Set(sections.flatMap(({ methods }) => methods.map(({ method }) => method)))];
  if (asked === undefined) return labels.includes(usualReference) ? usualReference : labels[0]!;
  if (labels.includes(asked)) return asked;
  throw new OnebatchError(
    'bad-input',
    `--against: the ledger holds no method "${asked}"; ${suggestion(asked, labels)}`,
  );
}

/**
 * Every other method against the reference, paired by task, curtain and seed, with Holm's correction over all of them.
 * Given several sections, each counts the same. Null where the reference shares no seed with any method.
 */
export function holdAgainst(
  sections: readonly SectionCells[],
  against: Against,
  stream: Stream,
): ReferenceBlock | null {
  const reference = cellsByMethod(sections).get(against.method);
  if (reference === undefined) return null;
  const ours = stream.split('against the reference');
  const patterns = new SignPatterns(ours);
  const compared = [...cellsByMethod(sections)].flatMap(([method, cells]) => {
    if (method === against.method) return [];
    const pairs = pairRows(
      cells.flatMap(({ rows }) => rows),
      reference.flatMap(({ rows }) => rows),
      against.score,
    );
    if (pairs.length === 0) return [];
    const differences = pairs.map((task) => task.differences);
    const test = testTaskDifferences(differences, { margin: against.margin, stream: ours, patterns });
    return [{ method, settings: cells[0]!.settings, pairs, test }];
  });
  if (compared.length === 0) return null;
  const decisions = decide(compared, against, ours);
  const methods = compared.map(({ method, settings, pairs, test }, i) => ({
    method,
    settings,
    ...describeTest(test),
    ...describePairs(pairs, against.margin),
    ...decisions[i]!,
  }));
  return { ...against, methods: methods.sort((a, b) => b.difference.value - a.difference.value) };
}

function decide(
  compared: readonly { readonly test: DifferenceTest; readonly pairs: readonly TaskPairs[] }[],
  against: Against,
  stream: Stream,
): (Decision & Pick<AgainstReference, 'look'>)[] {
  const atOnce = adjustAndDecide(
    compared.map(({ test }) => test),
    against,
  );
  if (against.looks === null) return atOnce.map((decision) => ({ ...decision, look: null }));
  const pairs = compared.map((method) => method.pairs);
  return decideAtLooks(pairs, against.looks, { ...against, stream }).map((looked, i) => {
    const { adjustedP, adjustedEquivalenceP, seedsNeeded } = atOnce[i]!;
    const decided =
      looked.verdict === 'undecided' ? { look: null, seedsNeeded } : { look: looked.look, seedsNeeded: null };
    return { adjustedP, adjustedEquivalenceP, verdict: looked.verdict, ...decided };
  });
}

function cellsByMethod(sections: readonly SectionCells[]): Map<string, MethodCells[]> {
  const methods = new Map<string, MethodCells[]>();
  for (const cells of sections.flatMap((section) => section.methods)) {
    const known = methods.get(cells.method);
    if (known) known.push(cells);
    else methods.set(cells.method, [cells]);
  }
  return methods;
}

function describeTest(test: DifferenceTest) {
  return {
    tasks: test.tasks,
    pairs: test.n,
    difference: { value: test.mean, n: test.n, interval: test.interval },
    standardDeviation: test.standardDeviation,
    p: test.p,
    test: test.test,
    monteCarloStandardError: test.monteCarloStandardError,
    equivalenceP: test.equivalenceP,
  };
}

function describePairs(tasks: readonly TaskPairs[], margin: number) {
  const outcomes = countOutcomes(
    tasks.flatMap(({ differences }) => differences),
    margin,
  );
  return { unpaired: tasks.reduce((sum, { unpaired }) => sum + unpaired, 0), ...outcomes };
}
