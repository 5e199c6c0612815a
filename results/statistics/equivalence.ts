import t from '@stdlib/stats-base-dists-t';
import { checkShare, checkValues } from './check-values.js';
import { moments } from './moments.js';
import { studentInterval } from './student-interval.js';

/** One of the two tests: `lower` against a mean difference of −margin or less, `upper` against +margin or more. */
export interface OneSidedTest {
  readonly t: number;
  readonly p: number;
}

/** How a test of equivalence came out. */
export interface EquivalenceTest {
  /** `constant` where all differences are equal: p is then 0 or 1, by comparison with the margin alone. */
  readonly method: 'two-one-sided-t' | 'constant';
  readonly n: number;
  readonly meanDifference: number;
  readonly standardError: number;
  readonly degreesOfFreedom: number;
  readonly margin: number;
  readonly alpha: number;
  readonly lower: OneSidedTest;
  readonly upper: OneSidedTest;
  /** The larger of the two p-values. */
  readonly p: number;
  /** p ≤ alpha: the mean difference lies within ±margin. The same as `low` > −margin and `high` < margin. */
  readonly equivalent: boolean;
  /** Student's interval of the mean difference at `level` = 1 − 2 alpha. */
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Two one-sided paired t tests (Schuirmann 1987): whether a mean difference is shown to be smaller than a margin.
 *
 * @param differences (n), n ≥ 2, candidate minus reference.
 * @param options.margin the largest difference without practical meaning, above 0, in the unit of the differences.
 * @param options.alpha 0.05 unless given; below ½.
 * @throws RangeError for fewer than two differences, one that isn't finite, or a margin or alpha out of range.
 */
export function equivalenceTest(
  differences: ArrayLike<number>,
  options: { readonly margin: number; readonly alpha?: number },
): EquivalenceTest {
  const { margin, alpha = 0.05 } = options;
  checkShare(2 * alpha, 'twice alpha');
  if (!(margin > 0 && Number.isFinite(margin))) throw new RangeError(`margin must be above 0, got ${margin}`);
  checkValues(differences, 'differences', 2);
  const { n, mean, standardError } = moments(differences);
  const degreesOfFreedom = n - 1;
  const { lower, upper, p } = testWithin(margin, { mean, standardError: standardError!, degreesOfFreedom });
  const { level, low, high } = studentInterval(differences, { level: 1 - 2 * alpha });
  return {
    method: standardError === 0 ? 'constant' : 'two-one-sided-t',
    n,
    meanDifference: mean,
    standardError: standardError!,
    degreesOfFreedom,
    margin,
    alpha,
    lower,
    upper,
    p,
    equivalent: p <= alpha,
    level,
    low,
    high,
  };
}

/**
 * The two one-sided t tests of a mean with a known standard error and degrees of freedom, as for a mean over several
 * tasks: `lower` alone tests that the mean is not worse than −margin (non-inferiority).
 *
 * @param margin above 0, in the unit of the mean.
 */
export function testWithin(
  margin: number,
  about: { readonly mean: number; readonly standardError: number; readonly degreesOfFreedom: number },
): { readonly lower: OneSidedTest; readonly upper: OneSidedTest; readonly p: number } {
  const { mean, standardError, degreesOfFreedom } = about;
  const lower = testAbove(mean + margin, standardError, degreesOfFreedom);
  const mirrored = testAbove(margin - mean, standardError, degreesOfFreedom);
  return { lower, upper: { t: -mirrored.t, p: mirrored.p }, p: Math.max(lower.p, mirrored.p) };
}

/** Test of a mean of 0 or less against a mean above 0. */
function testAbove(mean: number, standardError: number, degreesOfFreedom: number): OneSidedTest {
  if (standardError === 0) return mean > 0 ? { t: Infinity, p: 0 } : { t: mean < 0 ? -Infinity : 0, p: 1 };
  const statistic = mean / standardError;
  return { t: statistic, p: t.cdf(-statistic, degreesOfFreedom) };
}
