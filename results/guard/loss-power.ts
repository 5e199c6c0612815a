import normal from '@stdlib/stats-base-dists-normal';
import { pairedPower, pairsForDifference } from '../statistics/power.js';
import { mostSeeds, plannedPower, type SeedsNeeded } from '../verdict.js';

/** What a one-sided test of a loss is asked to find. */
export interface LossDesign {
  /** True loss, above 0. */
  readonly loss: number;
  /** Standard deviation of the differences, in the same unit. */
  readonly standardDeviation: number;
  /** Level of the one-sided test, below ½. */
  readonly level: number;
}

/** With fewer sign patterns than this at or below the level, a sign-flip test finds clearly less than a t test. */
const manyPatterns = 8;

/**
 * Chance that the one-sided sign-flip test of n pairs shows a true loss. Where the level holds many sign patterns it is
 * that of the one-sided paired t test, to which the sign-flip test comes close (Hoeffding 1952): the two-sided one at
 * twice the level. Where it holds few, the chance that all differences of normal values are negative, which is a lower
 * bound; where it holds none, 0: the test can't give so small a p. A deviation of 0 gives 1 otherwise.
 *
 * @throws RangeError for a negative deviation, or a level out of range.
 */
export function chanceToShow(pairs: number, { loss, standardDeviation, level }: LossDesign): number {
  const patterns = Math.floor(level * 2 ** pairs);
  if (patterns < 1) return 0;
  if (standardDeviation === 0) return 1;
  if (patterns < manyPatterns) return normal.cdf(loss / standardDeviation, 0, 1) ** pairs;
  return pairedPower(pairs, { difference: loss, standardDeviation, alpha: 2 * level });
}

/**
 * Seeds of each task with which the test shows a true loss with 80 % power, by `chanceToShow` where the level holds
 * many sign patterns.
 *
 * @param tasks tasks over which the pairs are spread evenly.
 */
export function seedsToShow(tasks: number, { loss, standardDeviation, level }: LossDesign): SeedsNeeded {
  const constant = standardDeviation === 0;
  const least = Math.ceil(Math.log2((constant ? 1 : manyPatterns) / level));
  const pairs = constant
    ? least
    : pairsForDifference({ difference: loss, standardDeviation, alpha: 2 * level, power: plannedPower })
        .pairs;
  const seeds = Math.ceil(Math.max(least, pairs) / tasks);
  return seeds > mostSeeds ? { kind: 'more-than', seeds: mostSeeds } : { kind: 'about', seeds };
}
