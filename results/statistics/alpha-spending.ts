import normal from '@stdlib/stats-base-dists-normal';
import { checkShare } from './check-values.js';

/** How far below zero the walk is followed, in standard deviations at the last look. */
const reach = 8;

/** Grid points for each standard deviation of a step. */
const pointsPerStep = 10;

/** A chance too small to be told from none. */
const negligible = 1e-15;

/**
 * The share of a one-sided level that may be spent when a share `information` of the data is in, by the
 * O'Brien-Fleming type function of Lan & DeMets 1983: 2 (1 − Φ(z₁₋α⸝₂ / √information)).
 *
 * @param information in (0, 1]; at 1 all of `alpha` is spent.
 * @throws RangeError for a share outside its range.
 */
export function spentAlpha(information: number, alpha: number): number {
  checkShare(alpha, 'alpha');
  if (!(information > 0 && information <= 1))
    throw new RangeError(`information: ${information} is not in (0, 1]`);
  if (information === 1) return alpha;
  return 2 * upperTail(upperQuantile(alpha / 2) / Math.sqrt(information));
}

/**
 * One-sided bounds for z statistics at successive looks at growing data: under the null hypothesis the chance that z
 * passes its bound at any look up to the k-th is what `spentAlpha` allows there (Lan & DeMets 1983; the chances by the
 * recursion of Armitage, McPherson & Rowe 1969). The error of a bound is below 1e-3 for up to 20 looks.
 *
 * A bound of Infinity means that the data can't yet decide at this level.
 *
 * @param information share of all data at each look, rising, the last at most 1.
 * @param alpha one-sided level, in (0, 1).
 * @throws RangeError for no look, or shares that don't rise within (0, 1].
 */
export function spendingBounds(information: readonly number[], alpha: number): number[] {
  if (information.length === 0) throw new RangeError('information: at least one look needed');
  const bounds: number[] = [];
  let walk: Walk = { time: 0, points: [0], masses: [1] };
  let spent = 0;
  for (const time of information) {
    if (!(time > walk.time && time <= 1)) throw new RangeError('information: must rise within (0, 1]');
    const toSpend = spentAlpha(time, alpha) - spent;
    const limit = toSpend > negligible ? findLimit(walk, time, toSpend) : Number.POSITIVE_INFINITY;
    bounds.push(limit / Math.sqrt(time));
    spent += Number.isFinite(limit) ? toSpend : 0;
    walk = advance(walk, time, limit);
  }
  return bounds;
}

/** Where a Brownian motion that has not passed a bound may stand, as point masses. */
interface Walk {
  readonly time: number;
  readonly points: readonly number[];
  readonly masses: readonly number[];
}

/** The value that the walk passes at `time` with the given chance, by halving. */
function findLimit(walk: Walk, time: number, chance: number): number {
  let low = -reach;
  let high = 2 * reach;
  for (let halving = 0; halving < 60; halving++) {
    const middle = (low + high) / 2;
    if (chanceAbove(walk, time, middle) > chance) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

function chanceAbove({ time: before, points, masses }: Walk, time: number, limit: number): number {
  const step = Math.sqrt(time - before);
  return points.reduce((sum, point, i) => sum + masses[i]! * upperTail((limit - point) / step), 0);
}

/** The walk at `time` given that it stands below `limit` there; trapezoidal rule. */
function advance({ time: before, points, masses }: Walk, time: number, limit: number): Walk {
  const step = Math.sqrt(time - before);
  const low = -reach * Math.sqrt(time);
  const high = Math.min(limit, reach * Math.sqrt(time));
  const count = Math.max(3, Math.ceil(((high - low) / step) * pointsPerStep));
  const spacing = (high - low) / (count - 1);
  const grid = Array.from({ length: count }, (_, i) => low + i * spacing);
  return {
    time,
    points: grid,
    masses: grid.map((value, i) => {
      const share = i === 0 || i === count - 1 ? spacing / 2 : spacing;
      const density = points.reduce((sum, point, j) => sum + masses[j]! * normal.pdf(value, point, step), 0);
      return share * density;
    }),
  };
}

/** P(Z > z) without losing digits where it is small. */
function upperTail(z: number): number {
  return normal.cdf(-z, 0, 1);
}

function upperQuantile(chance: number): number {
  return -normal.quantile(chance, 0, 1);
}
