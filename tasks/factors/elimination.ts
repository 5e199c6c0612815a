import { type EliminationStep, planElimination } from './elimination-plan.js';
import { type Factor, type FactorSum, strideOf } from './factor-sum.js';

/** Table look-ups that an exact maximum may cost; below about a second. */
export const exactWorkLimit = 20_000_000;

interface Choice extends EliminationStep {
  /** The best letter of `site` for every combination of letters of `others`. */
  readonly letters: Uint8Array;
}

/**
 * A sequence with the largest possible sum of factors, (sites); of equals, one is chosen deterministically.
 *
 * Sites are maximized away one after another (nonserial dynamic programming, Bertelè & Brioschi 1972; bucket
 * elimination, Dechter 1999): all tables that hold the site are added up and replaced by one table over the other
 * sites they hold. On a chain this is the usual dynamic programming along it; on a fully connected sum it is
 * exhaustive enumeration. The result is exact up to rounding of the sums. Works for alphabets of up to 256 letters.
 *
 * Returns `undefined` when this would take more than `workLimit` table look-ups.
 */
export function maximizeFactors(sum: FactorSum, workLimit = exactWorkLimit): Float64Array | undefined {
  const { sites, alphabet, factors } = sum;
  const steps = planElimination(
    sites,
    alphabet,
    factors.map((factor) => factor.sites),
    workLimit,
  );
  if (steps === undefined) return undefined;

  const holding = Array.from({ length: sites }, () => new Set<Factor>());
  for (const factor of factors) for (const site of factor.sites) holding[site]!.add(factor);
  const choices = steps.map((step): Choice => {
    const bucket = [...holding[step.site]!];
    const { letters, factor } = eliminate(step, bucket, alphabet);
    for (const used of bucket) for (const site of used.sites) holding[site]!.delete(used);
    for (const site of step.others) holding[site]!.add(factor);
    return { ...step, letters };
  });

  const design = new Float64Array(sites);
  for (const { site, others, letters } of choices.reverse()) {
    design[site] = letters[others.reduce((index, other) => index * alphabet + design[other]!, 0)]!;
  }
  return design;
}

function eliminate(
  { site, others }: EliminationStep,
  bucket: readonly Factor[],
  alphabet: number,
): { letters: Uint8Array; factor: Factor } {
  const combinations = alphabet ** others.length;
  const letters = new Uint8Array(combinations);
  const table = new Float64Array(combinations);
  const own = bucket.map((factor) => strideOf(factor.sites, site, alphabet));
  const strides = others.map((other) => bucket.map((factor) => strideOf(factor.sites, other, alphabet)));
  const index = new Int32Array(bucket.length);
  const digits = new Uint8Array(others.length);
  const sums = new Float64Array(alphabet);

  for (let combination = 0; combination < combinations; combination++) {
    sums.fill(0);
    for (let f = 0; f < bucket.length; f++) {
      const values = bucket[f]!.table;
      for (let a = 0, at = index[f]!; a < alphabet; a++, at += own[f]!) sums[a]! += values[at]!;
    }
    let best = 0;
    for (let a = 1; a < alphabet; a++) if (sums[a]! > sums[best]!) best = a;
    letters[combination] = best;
    table[combination] = sums[best]!;

    for (let d = others.length - 1; d >= 0; d--) {
      const turnsOver = digits[d] === alphabet - 1;
      const move = turnsOver ? 1 - alphabet : 1;
      digits[d]! += move;
      for (let f = 0; f < bucket.length; f++) index[f]! += move * strides[d]![f]!;
      if (!turnsOver) break;
    }
  }
  return { letters, factor: { sites: others, table } };
}
