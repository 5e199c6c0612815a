import { type Designs, rowView } from '../../harness/designs.js';

/**
 * A contribution that depends on a few sites of a sequence: one number for every combination of their letters.
 * `table` has alphabet^(number of sites) entries; the first site is the most significant digit of the index.
 */
export interface Factor {
  /** Different sites, counted from 0. */
  readonly sites: readonly number[];
  readonly table: ArrayLike<number>;
}

/** A score over sequences of `sites` letters from 0 … alphabet − 1 that is a sum of factors. */
export interface FactorSum {
  readonly sites: number;
  readonly alphabet: number;
  readonly factors: readonly Factor[];
}

/** The sum of all factors at each design, (n, sites) to (n); the factors are added in their order. */
export function scoreFactors({ alphabet, factors }: FactorSum, designs: Designs): Float64Array {
  const scores = new Float64Array(designs.rows);
  for (let i = 0; i < designs.rows; i++) {
    const row = rowView(designs, i);
    let score = 0;
    for (const { sites, table } of factors) {
      let index = 0;
      for (let k = 0; k < sites.length; k++) index = index * alphabet + row[sites[k]!]!;
      score += table[index]!;
    }
    scores[i] = score;
  }
  return scores;
}

/** How far a table's index moves when the letter of `site` goes up by one; 0 when the table does not hold it. */
export function strideOf(sites: readonly number[], site: number, alphabet: number): number {
  const position = sites.indexOf(site);
  return position < 0 ? 0 : alphabet ** (sites.length - 1 - position);
}
