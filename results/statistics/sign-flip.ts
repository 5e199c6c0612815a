import type { Stream } from '../../harness/random.js';
import { checkCount, checkValues } from './check-values.js';
import { moments } from './moments.js';

/** Up to so many pairs every pattern of signs is counted; beyond, patterns are drawn. */
export const exactUpTo = 16;

/** Sums that differ by less than this share of the sum of sizes count as equal, for rounding depends on signs. */
const tieTolerance = 1e-12;

/** The side on which a difference speaks against "no difference". */
export type Alternative = 'two-sided' | 'greater' | 'less';

/** How a sign-flip test came out. */
export type SignFlipTest = Base & (Enumerated | Drawn);

interface Base {
  readonly n: number;
  readonly meanDifference: number;
  readonly alternative: Alternative;
  /** In (0, 1]; never 0, for the observed signs are one of the patterns. */
  readonly p: number;
}

interface Enumerated {
  readonly method: 'sign-flip-exact';
  /** All patterns of signs, 2^n. */
  readonly patterns: number;
}

interface Drawn {
  readonly method: 'sign-flip-drawn';
  /** Patterns drawn. */
  readonly flips: number;
  /** Standard error that drawing, instead of counting all patterns, gives to p: √(p(1 − p)/flips). */
  readonly monteCarloStandardError: number;
}

/**
 * Paired sign-flip permutation test of a mean difference of zero (Fisher 1935, section 21): if the two methods don't
 * differ, each difference could as well have had the other sign. The p-value is the share of sign patterns whose sum
 * lies at least as far out as the observed one; differences of zero stay in. It assumes that differences are
 * symmetric about their centre, and nothing else of their distribution.
 *
 * Up to 16 pairs all 2^n patterns are counted, so that p is exact. Beyond, `flips` patterns are drawn and
 * p = (1 + count) / (1 + flips) (Phipson & Smyth 2010).
 *
 * @param differences (n), n ≥ 1, candidate minus reference; `greater` asks whether the candidate is larger.
 * @param options.alternative `two-sided` unless given.
 * @param options.flips patterns drawn beyond 16 pairs; 20,000 unless given.
 * @throws RangeError for no differences or one that isn't finite.
 */
export function signFlipTest(
  differences: ArrayLike<number>,
  options: { readonly alternative?: Alternative; readonly flips?: number; readonly stream: Stream },
): SignFlipTest {
  const { alternative = 'two-sided', flips = 20_000, stream } = options;
  checkValues(differences, 'differences');
  checkCount(flips, 'flips');
  const n = differences.length;
  const values = Float64Array.from(differences);
  const exact = n <= exactUpTo;
  const observed = values.reduce((sum, value) => sum + value, 0);
  const sums = exact ? allSums(values) : drawnSums(values, flips, stream);
  const tie = tieTolerance * values.reduce((sum, value) => sum + Math.abs(value), 0);
  const count = countAsFarOut(sums, observed, tie, alternative);
  const base = { n, meanDifference: moments(values).mean, alternative };
  if (exact) return { method: 'sign-flip-exact', ...base, p: count / sums.length, patterns: sums.length };
  const p = (1 + count) / (1 + flips);
  const monteCarloStandardError = Math.sqrt((p * (1 - p)) / flips);
  return { method: 'sign-flip-drawn', ...base, p, flips, monteCarloStandardError };
}

/** The sum under each of the 2^n sign patterns; every value in turn doubles the list by flipping its own sign. */
function allSums(values: Float64Array): Float64Array {
  const sums = new Float64Array(2 ** values.length);
  sums[0] = values.reduce((sum, value) => sum + value, 0);
  values.forEach((value, i) => {
    const known = 2 ** i;
    for (let pattern = 0; pattern < known; pattern++) sums[known + pattern] = sums[pattern]! - 2 * value;
  });
  return sums;
}

/** The sum under `flips` random sign patterns; each uniform number gives 32 signs. */
function drawnSums(values: Float64Array, flips: number, stream: Stream): Float64Array {
  const sums = new Float64Array(flips);
  for (let flip = 0; flip < flips; flip++) {
    let sum = 0;
    let bits = 0;
    for (let i = 0; i < values.length; i++) {
      bits = i % 32 === 0 ? Math.floor(stream.uniform() * 2 ** 32) : bits >>> 1;
      sum += bits & 1 ? values[i]! : -values[i]!;
    }
    sums[flip] = sum;
  }
  return sums;
}

function countAsFarOut(sums: Float64Array, observed: number, tie: number, alternative: Alternative): number {
  const side = alternative === 'less' ? -1 : 1;
  const far = alternative === 'two-sided' ? Math.abs(observed) : side * observed;
  let count = 0;
  for (const sum of sums) {
    const reach = alternative === 'two-sided' ? Math.abs(sum) : side * sum;
    if (reach >= far - tie) count++;
  }
  return count;
}
