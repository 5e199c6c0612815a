import { checkShare } from './check-values.js';
import { moments } from './moments.js';
import { studentInterval } from './student-interval.js';
import { transformedInterval } from './transformed-interval.js';

/** From so many values on the interval of a mean allows for their skewness; fewer don't show it well enough. */
export const transformedFrom = 8;

/** A mean, and how far it can be trusted. */
export type MeanInterval = Bounded<MeanOfScattered> | Bounded<ConstantMean> | UnknownMean;

/** What every interval of a mean carries. */
interface Base {
  readonly n: number;
  readonly mean: number;
  readonly level: number;
}

type Bounded<Method> = Base & Method & { readonly low: number; readonly high: number };

interface MeanOfScattered {
  readonly method: 'transformed-t' | 'student-t';
  readonly degreesOfFreedom: number;
}

/** All values are equal: low = high = mean, which says nothing about how far other values would scatter. */
interface ConstantMean {
  readonly method: 'constant';
}

/** One value: no interval can be given. */
interface UnknownMean extends Base {
  readonly method: 'none';
}

/**
 * Interval of a mean of independent values (n), n ≥ 1, in their own unit, by the method that their number allows:
 * from 8 values on by Hall's transformation of the t statistic (Hall 1992), which allows for skewness, below that
 * Student's t (Student 1908), for equal values `constant` with both bounds at the value, and for a single value `none`,
 * without bounds.
 *
 * @param options.level confidence, in (0, 1); 0.95 unless given.
 * @throws RangeError for no values, a value that isn't finite, or a level outside (0, 1).
 */
export function meanInterval(
  values: ArrayLike<number>,
  options: { readonly level?: number } = {},
): MeanInterval {
  const { level = 0.95 } = options;
  checkShare(level, 'level');
  const { n, mean, standardDeviation } = moments(values);
  if (standardDeviation === undefined) return { method: 'none', n, mean, level };
  if (standardDeviation === 0) return { method: 'constant', n, mean, level, low: mean, high: mean };
  const interval = n < transformedFrom ? studentInterval : transformedInterval;
  const { method, low, high, degreesOfFreedom } = interval(values, { level });
  return { method, n, mean, level, degreesOfFreedom, low, high };
}
