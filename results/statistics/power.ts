import normal from '@stdlib/stats-base-dists-normal';
import t from '@stdlib/stats-base-dists-t';
import { checkCount, checkShare } from './check-values.js';
import { expectScaledChi } from './scaled-chi.js';

/** Above so many pairs t is taken as normal, which changes the number by a share of about 1e-5. */
const normalFrom = 100_000;

/** What a paired t test is asked to find. */
export interface PairedDesign {
  /** True mean difference. */
  readonly difference: number;
  /** Standard deviation of the differences, above 0, in the same unit. */
  readonly standardDeviation: number;
  /** Chance of a false finding; 0.05 unless given. */
  readonly alpha?: number;
}

/** Pairs that a test needs. */
export interface PairsNeeded {
  readonly method: 'noncentral-t' | 'normal';
  /** The smallest number with at least the power asked for; at least 2. */
  readonly pairs: number;
  readonly power: number;
  readonly alpha: number;
}

/**
 * Power of the two-sided paired t test with n pairs, from the noncentral t distribution: the chance that it finds a
 * true mean difference (Cohen 1988). Exact for normal differences.
 *
 * @throws RangeError for fewer than 2 pairs, or a deviation or alpha out of range.
 */
export function pairedPower(pairs: number, design: PairedDesign): number {
  const { difference, standardDeviation, alpha = 0.05 } = design;
  checkDesign(design);
  checkCount(pairs, 'pairs', 2);
  const shift = (Math.sqrt(pairs) * Math.abs(difference)) / standardDeviation;
  const critical = t.quantile(1 - alpha / 2, pairs - 1);
  return expectScaledChi(
    pairs - 1,
    (scale) => normal.cdf(shift - critical * scale, 0, 1) + normal.cdf(-shift - critical * scale, 0, 1),
  );
}

/**
 * The smallest number of pairs with which the two-sided paired t test finds a true mean difference with the given
 * power, from `pairedPower`; above 100,000 pairs from ((z(1 − α/2) + z(power)) · sd / difference)².
 *
 * @param design.power 0.8 unless given (Cohen 1988).
 * @throws RangeError for a difference of 0, which no number of pairs finds, or as `pairedPower`.
 */
export function pairsForDifference(design: PairedDesign & { readonly power?: number }): PairsNeeded {
  const { difference, standardDeviation, alpha = 0.05, power = 0.8 } = design;
  checkDesign(design);
  checkShare(power, 'power');
  if (difference === 0) throw new RangeError('no number of pairs finds a difference of 0');
  const quantiles = normal.quantile(1 - alpha / 2, 0, 1) + normal.quantile(power, 0, 1);
  const approximate = ((quantiles * standardDeviation) / difference) ** 2;
  return searchPairs(approximate, (pairs) => pairedPower(pairs, design), { alpha, power });
}

/**
 * Power of two one-sided paired t tests (Schuirmann 1987) with n pairs: the chance that they show a true mean
 * difference to lie within ±margin. Given the sample's deviation the chance is a difference of two normal
 * probabilities, which is averaged over that deviation (Phillips 1990); absolute error below 1e-5.
 *
 * @throws RangeError for fewer than 2 pairs, or a margin, deviation or alpha out of range.
 */
export function equivalencePower(pairs: number, design: PairedDesign & { readonly margin: number }): number {
  const { difference, standardDeviation, margin, alpha = 0.05 } = design;
  checkDesign(design);
  checkCount(pairs, 'pairs', 2);
  if (!(margin > 0)) throw new RangeError(`margin must be above 0, got ${margin}`);
  const unit = Math.sqrt(pairs) / standardDeviation;
  const critical = t.quantile(1 - alpha, pairs - 1);
  return expectScaledChi(pairs - 1, (scale) => {
    const upper = normal.cdf(unit * (margin - difference) - critical * scale, 0, 1);
    const lower = normal.cdf(critical * scale - unit * (margin + difference), 0, 1);
    return Math.max(0, upper - lower);
  });
}

/**
 * The smallest number of pairs with which two one-sided paired t tests show a true mean difference to lie within
 * ±margin with the given power, from `equivalencePower`; above 100,000 pairs from the normal approximation.
 *
 * @param design.power 0.8 unless given.
 * @throws RangeError for a difference at or outside the margin, which no number of pairs shows to lie within it, or
 * as `equivalencePower`.
 */
export function pairsForEquivalence(
  design: PairedDesign & { readonly margin: number; readonly power?: number },
): PairsNeeded {
  const { difference, standardDeviation, margin, alpha = 0.05, power = 0.8 } = design;
  checkDesign(design);
  checkShare(power, 'power');
  const room = margin - Math.abs(difference);
  if (!(room > 0)) throw new RangeError(`no number of pairs shows ${difference} to lie within ±${margin}`);
  const sides = difference === 0 ? (1 + power) / 2 : power;
  const quantiles = normal.quantile(1 - alpha, 0, 1) + normal.quantile(sides, 0, 1);
  const approximate = ((quantiles * standardDeviation) / room) ** 2;
  return searchPairs(approximate, (pairs) => equivalencePower(pairs, design), { alpha, power });
}

/** The first number of pairs, from 2 on, whose power suffices; power rises with their number. */
function searchPairs(
  approximate: number,
  powerOf: (pairs: number) => number,
  { alpha, power }: { readonly alpha: number; readonly power: number },
): PairsNeeded {
  if (approximate > normalFrom) return { method: 'normal', pairs: Math.ceil(approximate), power, alpha };
  let low = Math.max(1, Math.floor(approximate));
  for (let step = 1; low > 1 && powerOf(low) >= power; step *= 2) low = Math.max(1, low - step);
  let high = low + 1;
  for (let step = 1; powerOf(high) < power; step *= 2) {
    low = high;
    high += step;
  }
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (powerOf(middle) < power) low = middle;
    else high = middle;
  }
  return { method: 'noncentral-t', pairs: high, power: powerOf(high), alpha };
}

function checkDesign({ difference, standardDeviation, alpha = 0.05 }: PairedDesign): void {
  checkShare(alpha, 'alpha');
  if (!Number.isFinite(difference)) throw new RangeError(`difference must be finite, got ${difference}`);
  if (!(standardDeviation > 0 && Number.isFinite(standardDeviation)))
    throw new RangeError(`standard deviation must be above 0, got ${standardDeviation}`);
}
