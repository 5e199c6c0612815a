import type { Stream } from '../../harness/random.js';
import { checkCount, checkValues } from './check-values.js';
import { moments } from './moments.js';

/** Up to so many pairs every pattern of signs is counted; beyond, patterns are drawn. */
export const exactUpTo = 16;

/** Sums that differ by less than this share of the sum of sizes count as equal, for rounding depends on signs. */
const tieTolerance = 1e-12;

/** Patterns drawn beyond `exactUpTo` pairs unless told otherwise. */
export const defaultFlips = 20_000;

/** Bytes of drawn patterns kept for use again. */
const mostKept = 2 ** 25;

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
 * @param options.patterns patterns shared between tests, instead of flips drawn from the stream.
 * @throws RangeError for no differences or one that isn't finite.
 */
export function signFlipTest(
  differences: ArrayLike<number>,
  options: { readonly alternative?: Alternative } & (
    | { readonly flips?: number; readonly stream: Stream }
    | { readonly patterns: SignPatterns }
  ),
): SignFlipTest {
  const { alternative = 'two-sided' } = options;
  checkValues(differences, 'differences');
  const patterns =
    'patterns' in options
      ? options.patterns
      : new SignPatterns(options.stream, options.flips ?? defaultFlips);
  const { flips } = patterns;
  const n = differences.length;
  const values = Float64Array.from(differences);
  const exact = n <= exactUpTo;
  const observed = values.reduce((sum, value) => sum + value, 0);
  const sums = exact ? allSums(values) : drawnSums(values, patterns);
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

/** The sum under each drawn sign pattern, eight signs at a time: a table holds the sums of all patterns of eight. */
function drawnSums(values: Float64Array, patterns: SignPatterns): Float64Array {
  const groups = Math.ceil(values.length / 8);
  const tables = Array.from({ length: groups }, (_, g) => sumsOfEight(values.subarray(8 * g, 8 * g + 8)));
  const sums = new Float64Array(patterns.flips);
  for (const { from, size, signs } of patterns.blocks(values.length)) {
    const part = sums.subarray(from, from + size);
    for (let g = 0; g < groups; g++) addEntries(part, tables[g]!, signs, g * size);
  }
  return sums;
}

/** Adds to each sum the entry of the table that its sign byte, from `start` on, stands for. */
function addEntries(sums: Float64Array, table: Float64Array, signs: Uint8Array, start: number): void {
  for (let i = 0; i < sums.length; i++) sums[i]! += table[signs[start + i]!]!;
}

/** Sums of up to eight values under all 256 patterns; bit k set keeps the sign of value k. */
function sumsOfEight(values: Float64Array): Float64Array {
  const sums = new Float64Array(256);
  for (let pattern = 0; pattern < 256; pattern++) {
    let sum = 0;
    for (let k = 0; k < values.length; k++) sum += (pattern >>> k) & 1 ? values[k]! : -values[k]!;
    sums[pattern] = sum;
  }
  return sums;
}

/** Random sign patterns, drawn once for all tests with the same number of pairs. */
export class SignPatterns {
  readonly flips: number;
  readonly #stream: Stream;
  readonly #kept = new Map<number, readonly SignBlock[]>();

  /** @param flips patterns; 20,000 unless given. */
  constructor(stream: Stream, flips = defaultFlips) {
    checkCount(flips, 'flips');
    this.flips = flips;
    this.#stream = stream;
  }

  /** The patterns for n pairs, a block after another; the next call may write over a block. */
  *blocks(n: number): Generator<SignBlock> {
    const words = Math.ceil(n / 32);
    const known = this.#kept.get(words);
    if (known !== undefined) {
      yield* known;
      return;
    }
    const stream = this.#stream.split('signs');
    const keep = 4 * words * this.flips <= mostKept;
    const blocks: SignBlock[] = [];
    const reused = new Uint8Array(keep ? 0 : 4 * words * blockSize);
    for (let from = 0; from < this.flips; from += blockSize) {
      const size = Math.min(blockSize, this.flips - from);
      const block = { from, size, signs: keep ? new Uint8Array(4 * words * size) : reused };
      drawBlock(block, words, stream);
      blocks.push(block);
      yield block;
    }
    if (keep) this.#kept.set(words, blocks);
  }
}

/** Patterns of a block: few enough that their sums stay near the processor. */
const blockSize = 2048;

/** Sign patterns `from` … `from + size − 1`: eight signs a byte, those of pairs 8g … 8g + 7 of flip f at `g * size + f`. */
interface SignBlock {
  readonly from: number;
  readonly size: number;
  readonly signs: Uint8Array;
}

/** Each uniform number gives 32 signs. */
function drawBlock({ size, signs }: SignBlock, words: number, stream: Stream): void {
  for (let flip = 0; flip < size; flip++) {
    for (let word = 0; word < words; word++) {
      const bits = Math.floor(stream.uniform() * 2 ** 32);
      const at = 4 * word * size + flip;
      signs[at] = bits;
      signs[at + size] = bits >>> 8;
      signs[at + 2 * size] = bits >>> 16;
      signs[at + 3 * size] = bits >>> 24;
    }
  }
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
