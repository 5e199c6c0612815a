import { quantileSorted as interpolate } from 'simple-statistics';

/**
 * The p-quantile of a sample by type 7 of Hyndman & Fan 1996 (The American Statistician 50): linear interpolation
 * between the order statistics around h = (n − 1)p, the usual default of statistical software.
 *
 * `values` in any order, (n) with n ≥ 1, left as they are; `p` in [0, 1]. NaN among the values gives NaN.
 *
 * @throws RangeError when there are no values or p lies outside [0, 1].
 */
export function quantile(values: ArrayLike<number>, p: number): number {
  return quantileSorted(Float64Array.from(values).sort(), p);
}

/** As `quantile`, for values already in ascending order, NaN last, which is not checked. */
export function quantileSorted(sorted: ArrayLike<number>, p: number): number {
  if (sorted.length === 0) throw new RangeError('a quantile needs at least one value');
  if (!(p >= 0 && p <= 1)) throw new RangeError(`a quantile needs p from 0 to 1, got ${p}`);
  if (Number.isNaN(sorted[sorted.length - 1]!)) return Number.NaN;
  return interpolate(sorted as number[], p);
}
