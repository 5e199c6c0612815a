import type { DifferenceTest } from './paired.js';
import { holmAdjust } from './statistics/holm.js';
import { type PairsNeeded, pairsForDifference, pairsForEquivalence } from './statistics/power.js';

/** What a method does against the reference, in words. */
export const verdicts = ['helps', 'hurts', 'no real difference', 'undecided'] as const;

export type VerdictWord = (typeof verdicts)[number];

/** Family-wise level of all verdicts of a table, unless given. */
export const defaultAlpha = 0.05;

/** Numbers of seeds above this are not told apart. */
export const mostSeeds = 10_000;

/** Power that the number of seeds needed is for. */
export const plannedPower = 0.8;

/**
 * Seeds of each task that would decide with 80 % power, if the differences go on as they came: `about` so many,
 * `more-than` 10,000, or `unknown` where a single pair tells nothing of the spread.
 */
export type SeedsNeeded =
  | { readonly kind: 'about'; readonly seeds: number }
  | { readonly kind: 'more-than'; readonly seeds: number }
  | { readonly kind: 'unknown' };

/** A verdict and what it rests on. */
export interface Judgement {
  readonly verdict: VerdictWord;
  /** Of "no difference", by Holm over all tests given. */
  readonly adjustedP: number;
  /** Of "a difference at or outside the margin", by Holm over all tests given. */
  readonly adjustedEquivalenceP: number;
}

/** A verdict, and what would reach it where it isn't. */
export interface Decision extends Judgement {
  /** Null where the verdict is reached. */
  readonly seedsNeeded: SeedsNeeded | null;
}

/** What of a test the verdict looks at. */
export type Evidence = Pick<
  DifferenceTest,
  'tasks' | 'n' | 'mean' | 'standardDeviation' | 'interval' | 'p' | 'equivalenceP'
>;

/**
 * Verdicts of all methods of one table against its reference.
 *
 * *helps*: Holm-adjusted p < alpha and the interval above 0. *hurts*: the same, below 0. *no real difference*: neither,
 * and the Holm-adjusted p of the two one-sided tests within ±margin < alpha. Else *undecided*.
 *
 * The tests of "no difference" are one family, and those of "no small difference" another (Holm 1979 in each): the
 * chance of any wrong *helps* or *hurts* in the table is at most alpha, and so is that of any wrong *no real
 * difference*. A method that is shown to differ by less than the margin *helps* or *hurts*, for the interval says how
 * little.
 *
 * @param tests one for each method but the reference, (m); m may be 0.
 */
export function adjustAndJudge(
  tests: readonly Evidence[],
  options: { readonly alpha?: number } = {},
): Judgement[] {
  const { alpha = defaultAlpha } = options;
  const adjusted = holmAdjust(tests.map(({ p }) => p));
  const adjustedEquivalence = holmAdjust(tests.map(({ equivalenceP }) => equivalenceP));
  return tests.map((test, i) => {
    const adjustedP = adjusted[i]!;
    const adjustedEquivalenceP = adjustedEquivalence[i]!;
    return {
      verdict: decide(test, { adjustedP, adjustedEquivalenceP, alpha }),
      adjustedP,
      adjustedEquivalenceP,
    };
  });
}

/**
 * `adjustAndJudge`, and for each undecided method the number of seeds that would decide.
 *
 * @throws RangeError for a margin or alpha out of range.
 */
export function adjustAndDecide(
  tests: readonly Evidence[],
  options: { readonly margin: number; readonly alpha?: number },
): Decision[] {
  const { margin, alpha = defaultAlpha } = options;
  return adjustAndJudge(tests, { alpha }).map((judgement, i) => {
    const plan = { margin, alpha, tests: tests.length };
    const seedsNeeded = judgement.verdict === 'undecided' ? countSeedsNeeded(tests[i]!, plan) : null;
    return { ...judgement, seedsNeeded };
  });
}

/**
 * Seeds of each task that would decide with 80 % power, were the mean and deviation seen so far the true ones: the
 * smaller of the numbers that show a difference and, where the mean lies within the margin, that show that there is no
 * real one. Each test is planned at alpha / tests, the level of Holm's first step, so that the number rather errs
 * upwards; never fewer than one more than there are. A sign-flip test of n pairs has no p below 2^(1 − n), which sets a
 * least number too.
 */
export function countSeedsNeeded(
  { tasks, n, mean, standardDeviation }: Evidence,
  plan: { readonly margin: number; readonly alpha: number; readonly tests: number },
): SeedsNeeded {
  if (standardDeviation === null) return { kind: 'unknown' };
  const alpha = plan.alpha / plan.tests;
  const forDifference =
    mean === 0
      ? Number.POSITIVE_INFINITY
      : Math.max(
          leastPairs(alpha / 2),
          pairs(standardDeviation, (design) => pairsForDifference({ ...design, difference: mean, alpha })),
        );
  const forEquivalence =
    Math.abs(mean) < plan.margin
      ? pairs(
          standardDeviation,
          (design) => pairsForEquivalence({ ...design, difference: mean, margin: plan.margin, alpha }),
          leastPairs(alpha),
        )
      : Number.POSITIVE_INFINITY;
  const seeds = Math.max(
    Math.floor(n / tasks) + 1,
    Math.ceil(Math.min(forDifference, forEquivalence) / tasks),
  );
  return seeds > mostSeeds ? { kind: 'more-than', seeds: mostSeeds } : { kind: 'about', seeds };
}

/** The smallest p that Holm's procedure can give to the first of `tests` two-sided sign-flip tests with n pairs. */
export function smallestAdjustedP(n: number, tests: number): number {
  return Math.min(1, tests * 2 ** (1 - n));
}

function decide(
  { interval }: Evidence,
  {
    adjustedP,
    adjustedEquivalenceP,
    alpha,
  }: { adjustedP: number; adjustedEquivalenceP: number; alpha: number },
): VerdictWord {
  if (adjustedP < alpha && interval !== null && interval.low > 0) return 'helps';
  if (adjustedP < alpha && interval !== null && interval.high < 0) return 'hurts';
  return adjustedEquivalenceP < alpha ? 'no real difference' : 'undecided';
}

/** The first n with 2^−n < level. */
function leastPairs(level: number): number {
  return Math.floor(-Math.log2(level)) + 1;
}

/** Pairs for a deviation above 0; `constant` for one of 0. */
function pairs(
  standardDeviation: number,
  count: (design: { readonly standardDeviation: number; readonly power: number }) => PairsNeeded,
  constant = 1,
): number {
  return standardDeviation === 0 ? constant : count({ standardDeviation, power: plannedPower }).pairs;
}
