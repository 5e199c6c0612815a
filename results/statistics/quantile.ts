import { checkValues } from './check-values.js';

/**
 * The p-quantile by linear interpolation between order statistics at h = (n − 1)p: definition 7 of Hyndman & Fan
 * 1996, the default of R and NumPy.
 *
 * @param values (n), n ≥ 1, in any order and unit; not changed.
 * @param p in [0, 1]; 0 gives the minimum, 1 the maximum.
 * @throws RangeError for no values, a value that isn't finite, or p outside [0, 1].
 */
export function quantile(values: ArrayLike<number>, p: number): number {
  checkValues(values);
  return quantileSorted(Float64Array.from(values).sort(), p);
}

/** As `quantile`, for values already in ascending order, which is not checked. */
export function quantileSorted(sorted: ArrayLike<number>, p: number): number {
  if (sorted.length === 0) throw new RangeError('values: at least 1 needed, got 0');
  if (!(p >= 0 && p <= 1)) throw new RangeError(`a quantile needs p from 0 to 1, got ${p}`);
  const position = (sorted.length - 1) * p;
  const below = Math.floor(position);
  const lower = sorted[below]!;
  const upper = sorted[Math.min(below + 1, sorted.length - 1)]!;
  return lower + (position - below) * (upper - lower);
}

/** The median: the ½-quantile. Throws as `quantile`. */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}
