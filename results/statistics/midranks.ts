/** Ranks of a sample, and how its ties fall. */
export interface Ranking {
  /** (n); 1 for the smallest value, equal values sharing the mean of their ranks. */
  readonly ranks: Float64Array;
  /** Sizes of the groups of equal values, groups of one left out. */
  readonly tieSizes: readonly number[];
}

/** Ranks values (n) from the smallest on, ties averaged. Values are tied only when equal to the last bit. */
export function midranks(values: ArrayLike<number>): Ranking {
  const order = Array.from({ length: values.length }, (_, i) => i).sort((a, b) => values[a]! - values[b]!);
  const ranks = new Float64Array(values.length);
  const tieSizes: number[] = [];
  let start = 0;
  while (start < order.length) {
    let end = start + 1;
    while (end < order.length && values[order[end]!] === values[order[start]!]) end++;
    for (let k = start; k < end; k++) ranks[order[k]!] = (start + 1 + end) / 2;
    if (end - start > 1) tieSizes.push(end - start);
    start = end;
  }
  return { ranks, tieSizes };
}
