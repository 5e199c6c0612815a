import normal from '@stdlib/stats-base-dists-normal';
import { checkValues } from './check-values.js';
import { midranks } from './midranks.js';
import type { Alternative } from './sign-flip.js';

/** Up to so many nonzero differences the distribution is computed exactly. */
const exactUpTo = 50;

/** How a signed-rank test came out. */
export interface WilcoxonTest {
  readonly method: 'wilcoxon-exact' | 'wilcoxon-normal';
  /** Differences given, zeros included. */
  readonly n: number;
  readonly zeros: number;
  /** Sum of the ranks of positive differences, with half of those of zeros where they are split. */
  readonly positiveRanks: number;
  readonly negativeRanks: number;
  readonly alternative: Alternative;
  readonly p: number;
}

/**
 * Wilcoxon's signed-rank test that differences are symmetric about zero (Wilcoxon 1945). Ties in size share the mean
 * of their ranks. Up to 50 nonzero differences the p-value is exact, ties included: signs are flipped over the ranks
 * as they are. Beyond, the normal approximation with the variance Σ rank²/4, without a continuity correction.
 *
 * @param differences (n), n ≥ 1. Two of them are tied only when equal to the last bit; round them where that matters.
 * @param options.zeros `split`, unless given, ranks differences of zero with the others and gives half of their ranks
 * to either side (Demšar 2006, section 3.1.3), which leaves the test of the signs as Pratt (1959) has it; `drop`
 * leaves them out first, as Wilcoxon did.
 * @throws RangeError for no differences or one that isn't finite.
 */
export function wilcoxonTest(
  differences: ArrayLike<number>,
  options: { readonly alternative?: Alternative; readonly zeros?: 'split' | 'drop' } = {},
): WilcoxonTest {
  const { alternative = 'two-sided', zeros: handling = 'split' } = options;
  checkValues(differences, 'differences');
  const all = Array.from(differences);
  const kept = handling === 'drop' ? all.filter((value) => value !== 0) : all;
  const { ranks } = midranks(kept.map(Math.abs));
  const signed = kept.map((value, i) => ({ sign: Math.sign(value), rank: ranks[i]! }));
  const sumOf = (sign: number): number =>
    signed.reduce((sum, one) => sum + (one.sign === sign ? one.rank : 0), 0);
  const flipped = signed.filter(({ sign }) => sign !== 0).map(({ rank }) => rank);
  const [positive, negative, split] = [sumOf(1), sumOf(-1), sumOf(0) / 2];
  const exact = flipped.length <= exactUpTo;
  const upperTail = exact ? exactUpperTail : normalUpperTail;
  return {
    method: exact ? 'wilcoxon-exact' : 'wilcoxon-normal',
    n: all.length,
    zeros: all.filter((value) => value === 0).length,
    positiveRanks: positive + split,
    negativeRanks: negative + split,
    alternative,
    p: pValue(alternative, upperTail(flipped, positive), upperTail(flipped, negative)),
  };
}

/** The distribution is symmetric, so that the lower tail of one sum is the upper tail of the other. */
function pValue(alternative: Alternative, greater: number, less: number): number {
  if (alternative === 'two-sided') return Math.min(1, 2 * Math.min(greater, less));
  return alternative === 'greater' ? greater : less;
}

/** P(sum of the ranks with positive sign ≥ sum) over random signs, rank after rank; doubled ranks are whole numbers. */
function exactUpperTail(ranks: readonly number[], sum: number): number {
  const doubled = ranks.map((rank) => Math.round(2 * rank));
  const most = doubled.reduce((total, rank) => total + rank, 0);
  const chance = new Float64Array(most + 1);
  chance[0] = 1;
  for (const rank of doubled) {
    for (let total = most; total >= 0; total--)
      chance[total] = (chance[total]! + (total >= rank ? chance[total - rank]! : 0)) / 2;
  }
  return Math.min(
    1,
    chance.subarray(Math.round(2 * sum)).reduce((tail, probability) => tail + probability, 0),
  );
}

function normalUpperTail(ranks: readonly number[], sum: number): number {
  const mean = ranks.reduce((total, rank) => total + rank, 0) / 2;
  const variance = ranks.reduce((total, rank) => total + rank ** 2, 0) / 4;
  return normal.cdf((mean - sum) / Math.sqrt(variance), 0, 1);
}
