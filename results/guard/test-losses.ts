import type { Stream } from '../../harness/random.js';
import type { Interval } from '../estimate.js';
import { type DifferenceTest, testTaskDifferences } from '../paired.js';
import { holmAdjust } from '../statistics/holm.js';
import { SignPatterns, signFlipTest } from '../statistics/sign-flip.js';
import { plannedPower, type SeedsNeeded } from '../verdict.js';
import { chanceToShow, seedsToShow } from './loss-power.js';
import type { GuardPairs, MethodPairs } from './pair-ledgers.js';

/** Family-wise level of a guard's tests. */
export const guardAlpha = 0.05;

/** Intervals that go with one-sided tests at 5 %, as with two one-sided tests (Schuirmann 1987). */
export const guardLevel = 1 - 2 * guardAlpha;

/**
 * What a test came to.
 *
 * - `regression`: a loss is shown, and one as large as the margin can't be ruled out.
 * - `small loss`: a loss is shown, and it is shown to be smaller than the margin.
 * - `no regression`: a loss as large as the margin is ruled out.
 * - `unchanged`: every pair has the same score.
 * - `none shown`: neither; a loss as large as the margin would have been shown with 80 % power or more.
 * - `too few seeds`: neither, and the power was less.
 */
export type LossOutcome =
  | 'regression'
  | 'small loss'
  | 'no regression'
  | 'unchanged'
  | 'none shown'
  | 'too few seeds';

/** One method on one task behind one curtain, or over all of them, before and after. */
export interface LossTest {
  readonly method: string;
  /** Null over all tasks. */
  readonly place: { readonly task: string; readonly curtain: string } | null;
  readonly outcome: LossOutcome;
  /** Pairs of cells; over all tasks those of all together. */
  readonly pairs: number;
  /** Mean of candidate − baseline; over all tasks the mean of task means. */
  readonly difference: number;
  /** Of this difference alone, at 90 %; null where a task has a single pair. */
  readonly interval: Interval | null;
  /** Of one difference, as `DifferenceTest` has it. */
  readonly standardDeviation: number | null;
  /** One-sided p against "no loss", Holm-adjusted over all tests whose scores changed. */
  readonly lossP: number;
  /** One-sided p against "a loss of the margin or more", Holm-adjusted likewise. */
  readonly marginP: number;
  /** Chance that a loss of the margin would have been shown; null with a single pair or nothing changed. */
  readonly power: number | null;
  /** Seeds of each task that would show a loss of the margin with 80 % power; null unless there are too few. */
  readonly seedsNeeded: SeedsNeeded | null;
  readonly failures: { readonly before: number; readonly after: number };
}

/**
 * Tests each method on each task, and with several tasks over all of them too, for a loss.
 *
 * A loss is tested by one-sided sign flips of the paired differences: where only random numbers changed, baseline and
 * candidate can be swapped in every pair, so that the test holds its level exactly, whatever the scores' distribution
 * and however few the seeds (Fisher 1935). That a loss is smaller than the margin is tested by the one-sided t test of
 * non-inferiority (the lower half of Schuirmann 1987), for sign flips about −margin would rest on symmetry that a
 * changed method need not have. Holm's procedure (Holm 1979) keeps the chance of any false alarm at 5 %, over all tests
 * whose scores changed in any pair: which these are doesn't depend on the signs, so that choosing them costs nothing.
 *
 * A regression needs a loss that is shown, and one of the margin that is not ruled out: a loss of the margin is so found
 * with the power of the first test, less the 5 % at most in which it is taken for a smaller one; and one that is shown to
 * be smaller never stops anybody.
 *
 * @param methods at least one, with the same sections.
 * @param options.margin largest loss without practical meaning, above 0.
 * @throws RangeError for a margin that isn't above 0 or a difference that isn't finite.
 */
export function testLosses(
  methods: readonly MethodPairs[],
  { margin, stream }: { readonly margin: number; readonly stream: Stream },
): LossTest[] {
  const subjects = methods.flatMap(subjectsOf);
  const changed = subjects.map(({ sections }) => {
    return sections.some(({ differences }) => differences.some((difference) => difference !== 0));
  });
  const family = changed.filter((it) => it).length;
  const level = guardAlpha / Math.max(1, family);
  const patterns = new SignPatterns(stream.split('signs'), Math.max(20_000, Math.ceil(10 / level)));
  const tests = subjects.map(({ sections }) => {
    const tasks = sections.map(({ differences }) => differences);
    return testTaskDifferences(tasks, { margin, level: guardLevel, stream, patterns });
  });
  const losses = subjects.map(({ sections }) => lossPOf(sections, patterns));
  const lossPs = adjustChanged(losses, changed);
  const marginPs = adjustChanged(
    tests.map(({ nonInferiorityP }) => nonInferiorityP),
    changed,
  );
  return subjects.map(({ method, place, sections }, i) => {
    const test = tests[i]!;
    const [lossP, marginP] = [lossPs[i]!, marginPs[i]!];
    const power = changed[i]! ? powerOf(test, { loss: margin, level }) : null;
    const outcome = changed[i]! ? decide(lossP, marginP, power) : 'unchanged';
    return {
      method,
      place,
      outcome,
      pairs: test.n,
      difference: test.mean,
      interval: test.interval,
      standardDeviation: test.standardDeviation,
      lossP,
      marginP,
      power,
      seedsNeeded: outcome === 'too few seeds' ? seedsFor(test, { loss: margin, level }) : null,
      failures: {
        before: sections.reduce((sum, { failures }) => sum + failures.before, 0),
        after: sections.reduce((sum, { failures }) => sum + failures.after, 0),
      },
    };
  });
}

interface Subject extends Pick<LossTest, 'method' | 'place'> {
  readonly sections: readonly GuardPairs[];
}

function subjectsOf({ method, sections }: MethodPairs): Subject[] {
  const each = sections.map((section) => {
    return { method, place: { task: section.task, curtain: section.curtain }, sections: [section] };
  });
  return sections.length > 1 ? [...each, { method, place: null, sections }] : each;
}

/** Sign flips of all pairs of all tasks; the statistic is the mean of task means. */
function lossPOf(sections: readonly GuardPairs[], patterns: SignPatterns): number {
  const weighted = sections.flatMap(({ differences }) =>
    differences.map((difference) => difference / (sections.length * differences.length)),
  );
  return signFlipTest(weighted, { alternative: 'less', patterns }).p;
}

/** Holm's adjustment over the tests that count; 1 for the others. */
function adjustChanged(pValues: readonly number[], changed: readonly boolean[]): number[] {
  const adjusted = holmAdjust(pValues.filter((_, i) => changed[i]));
  let next = 0;
  return pValues.map((_, i) => (changed[i] ? adjusted[next++]! : 1));
}

function powerOf(
  { n, standardDeviation }: DifferenceTest,
  design: { readonly loss: number; readonly level: number },
): number | null {
  return standardDeviation === null ? null : chanceToShow(n, { ...design, standardDeviation });
}

function seedsFor(
  { tasks, standardDeviation }: DifferenceTest,
  design: { readonly loss: number; readonly level: number },
): SeedsNeeded {
  return standardDeviation === null
    ? { kind: 'unknown' }
    : seedsToShow(tasks, { ...design, standardDeviation });
}

function decide(lossP: number, marginP: number, power: number | null): LossOutcome {
  if (lossP <= guardAlpha) return marginP <= guardAlpha ? 'small loss' : 'regression';
  if (marginP <= guardAlpha) return 'no regression';
  return power !== null && power >= plannedPower ? 'none shown' : 'too few seeds';
}
