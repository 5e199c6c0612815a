import { checkValues } from './check-values.js';

/**
 * Interquartile mean: the mean of the middle half of the values (Agarwal et al. 2021). A quarter of the n values, n/4
 * and not its whole part, is cut from each end, so a value at an edge counts with the fraction of it that is left.
 * Where 4 divides n this is the 25 % trimmed mean; elsewhere it differs from one that cuts whole values.
 *
 * @param values (n), n ≥ 1, in any order and unit; not changed.
 * @throws RangeError for no values or one that isn't finite.
 */
export function interquartileMean(values: ArrayLike<number>): number {
  checkValues(values);
  const sorted = Float64Array.from(values).sort();
  const places = Uint32Array.from(sorted, (_, i) => i);
  return interquartileMeanSorted(sorted, places, new Uint32Array(sorted.length).fill(1), sorted.length);
}

/**
 * Interquartile mean of a sample written as distinct places and how often each is taken.
 *
 * @param sorted (m), ascending, which is not checked.
 * @param places (m), where in `counts` each of them stands.
 * @param counts (m), how often it is taken.
 * @param total the sum of the counts, above 0.
 */
export function interquartileMeanSorted(
  sorted: Float64Array,
  places: Uint32Array,
  counts: Uint32Array,
  total: number,
): number {
  const from = total / 4;
  const to = total - from;
  let seen = 0;
  let i = 0;
  for (; seen + counts[places[i]!]! <= from; i++) seen += counts[places[i]!]!;
  let sum = 0;
  for (; seen < to; i++) {
    const before = seen;
    seen += counts[places[i]!]!;
    sum += (Math.min(seen, to) - Math.max(before, from)) * sorted[i]!;
  }
  return sum / (to - from);
}
