import { quantile as typeSeven } from '../../harness/quantile.js';
import { checkValues } from './check-values.js';

export { quantileSorted } from '../../harness/quantile.js';

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
  return typeSeven(values, p);
}

/** The median: the ½-quantile. Throws as `quantile`. */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}
