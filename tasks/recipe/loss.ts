import { type Stream, shuffleInPlace } from '../../harness/random.js';

/** How yield falls off when a numeric column is away from its ideal, in shares of the column's range. */
export interface Response {
  /** Loss when far away. */
  readonly weight: number;
  /** Distance below the ideal at which half of the weight is lost. */
  readonly widthBelow: number;
  /** The same above the ideal. */
  readonly widthAbove: number;
  /** Height and number of ripples over the range. */
  readonly rippleWeight: number;
  readonly ripples: number;
}

/** What choosing a level of a category column does. */
export interface Level {
  /** Loss for the choice itself: 0 at the best level, positive at every other. */
  readonly penalty: number;
  /** How far the ideal of each numeric column moves, in shares of its range: all 0 at the best level. */
  readonly shifts: Float64Array;
  /** Factor on all widths, at least 1: 1 at the best level, which is the most demanding. */
  readonly tolerance: number;
}

/** Two numeric columns that have to move together: (offset of first) = slope · (offset of second). */
export interface Pair {
  readonly first: number;
  readonly second: number;
  readonly slope: number;
  /** Distance from the line at which half of the weight is lost. */
  readonly width: number;
  readonly weight: number;
}

/** A yield whose best recipe is known. */
export interface Yield {
  /** Where each numeric column is best, as a share of its range, at the best levels. */
  readonly ideal: Float64Array;
  /** One for each numeric column. */
  readonly responses: readonly Response[];
  /** For each category column, its levels. */
  readonly choices: readonly (readonly Level[])[];
  readonly pairs: readonly Pair[];
}

/**
 * What a recipe loses of the best yield, 0 … `largestLoss`.
 *
 * `shares` holds the numeric columns as shares of their ranges, `levels` the level of each category column. The loss
 * is a sum of terms of which none is negative: the levels' penalties, and for each numeric column a saturating fall
 * and ripples, for each pair a saturating fall, all of them functions of offsets from the ideal that are 0 at offset
 * 0. At the best levels no ideal is moved, so at `ideal` and the best levels every term is 0 and the loss is 0: the
 * smallest there is. It is so nowhere else: another level pays its penalty, and at the best levels a numeric column off
 * its ideal pays its fall.
 */
export function lossOf(
  { ideal, responses, choices, pairs }: Yield,
  shares: Float64Array,
  levels: Float64Array,
): number {
  const chosen = choices.map((choice, k) => choice[levels[k]!]!);
  const tolerance = chosen.reduce((product, level) => product * level.tolerance, 1);
  const offsets = shares.map((share, j) => {
    const moved = chosen.reduce((at, level) => at + level.shifts[j]!, ideal[j]!);
    return share - Math.min(1, Math.max(0, moved));
  });

  let loss = chosen.reduce((total, level) => total + level.penalty, 0);
  responses.forEach(({ weight, widthBelow, widthAbove, rippleWeight, ripples }, j) => {
    const offset = offsets[j]!;
    loss += weight * saturate(offset / ((offset < 0 ? widthBelow : widthAbove) * tolerance));
    loss += rippleWeight * Math.sin(Math.PI * ripples * offset) ** 2;
  });
  for (const { first, second, slope, width, weight } of pairs) {
    loss += weight * saturate((offsets[first]! - slope * offsets[second]!) / (width * tolerance));
  }
  return loss;
}

/** A bound on the loss: every term at its weight. */
export function largestLoss({ responses, choices, pairs }: Yield): number {
  const numeric = responses.reduce((sum, { weight, rippleWeight }) => sum + weight + rippleWeight, 0);
  const choice = choices.reduce((sum, levels) => sum + Math.max(...levels.map((level) => level.penalty)), 0);
  return numeric + choice + pairs.reduce((sum, { weight }) => sum + weight, 0);
}

/** From 0 at 0 over 1/2 at ±1 to 1 far away. */
function saturate(z: number): number {
  return (z * z) / (1 + z * z);
}

/** What `drawYield` is asked for. */
export interface YieldOptions {
  /** Where each numeric column is best, as a share of its range. */
  readonly ideal: Float64Array;
  /** The best level of each category column. */
  readonly bestLevels: Float64Array;
  /** Levels of every category column. */
  readonly levels: number;
  /** 0 … 1: weight of the pairs, size of the shifts and of the differences in tolerance. */
  readonly interaction: number;
  /** 0 … 1: height of the ripples as a share of each column's weight. */
  readonly ruggedness: number;
}

/** Draws everything about a yield but its best recipe. With `interaction` 0 the loss is a sum over columns. */
export function drawYield(options: YieldOptions, stream: Stream): Yield {
  const { ideal, bestLevels, levels, interaction, ruggedness } = options;
  const between = (low: number, high: number): number => low + (high - low) * stream.uniform();
  const responses = Array.from(ideal, (): Response => {
    const weight = between(0.5, 1.5);
    const steep = between(0.08, 0.16);
    const gentle = steep * between(1.5, 3);
    const steepBelow = stream.below(2) === 0;
    return {
      weight,
      widthBelow: steepBelow ? steep : gentle,
      widthAbove: steepBelow ? gentle : steep,
      rippleWeight: ruggedness * weight,
      ripples: 3 + stream.below(3),
    };
  });
  const choices = Array.from(bestLevels, (best) =>
    Array.from({ length: levels }, (_, level): Level => {
      const isBest = level === best;
      const penalty = between(0.2, 1.2);
      const tolerance = between(1, 1 + 2 * interaction);
      const shifts = ideal.map((at) => {
        const towardsTheMiddle = at < 0.5 ? 1 : -1;
        return interaction * between(0, 0.8) * (stream.below(4) === 0 ? -towardsTheMiddle : towardsTheMiddle);
      });
      return isBest ? { penalty: 0, tolerance: 1, shifts: shifts.fill(0) } : { penalty, tolerance, shifts };
    }),
  );
  return { ideal, responses, choices, pairs: drawPairs(ideal.length, interaction, stream) };
}

/** Joins the numeric columns, in random order, to a ring: each belongs to two pairs (to one where there are two). */
function drawPairs(columns: number, interaction: number, stream: Stream): Pair[] {
  const order = shuffleInPlace(
    Array.from({ length: columns }, (_, j) => j),
    stream,
  );
  const count = columns < 3 ? columns - 1 : columns;
  return Array.from({ length: interaction > 0 ? count : 0 }, (_, m) => ({
    first: order[m]!,
    second: order[(m + 1) % columns]!,
    slope: (0.5 + stream.uniform()) * (stream.below(2) === 0 ? 1 : -1),
    width: 0.1 + 0.1 * stream.uniform(),
    weight: interaction * (0.5 + stream.uniform()),
  }));
}
