import type { Stream } from '../../harness/random.js';
import { bcaMeanInterval } from './bca.js';
import { checkShare } from './check-values.js';
import { moments } from './moments.js';
import { studentInterval } from './student-interval.js';

/** From so many values on the interval of a mean is bootstrapped; below, Student's t is used. */
export const bootstrapFrom = 8;

/** A mean, and how far it can be trusted. */
export type MeanInterval = Bounded<BcaMean> | Bounded<StudentMean> | Bounded<ConstantMean> | UnknownMean;

/** What every interval of a mean carries. */
interface Base {
  readonly n: number;
  readonly mean: number;
  readonly level: number;
}

type Bounded<Method> = Base & Method & { readonly low: number; readonly high: number };

interface BcaMean {
  readonly method: 'bca';
  readonly resamples: number;
}

interface StudentMean {
  readonly method: 'student-t';
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
 * from 8 values on the BCa bootstrap (Efron 1987), below that Student's t (Student 1908), for equal values `constant`
 * with both bounds at the value, and for a single value `none`, without bounds.
 *
 * BCa intervals of few values are somewhat too short: one of level 95 % from 16 normal values covers the mean in about
 * 92 % of samples.
 *
 * @param options.level confidence, in (0, 1); 0.95 unless given.
 * @param options.resamples bootstrap resamples; 10,000 unless given.
 * @param options.replicates gives those of `bcaMeanInterval`, where they are shared; called only if needed.
 * @throws RangeError for no values, a value that isn't finite, or a level outside (0, 1).
 */
export function meanInterval(
  values: ArrayLike<number>,
  options: { readonly level?: number } & (
    | { readonly resamples?: number; readonly stream: Stream }
    | { readonly replicates: () => Float64Array }
  ),
): MeanInterval {
  const { level = 0.95 } = options;
  checkShare(level, 'level');
  const { n, mean, standardDeviation } = moments(values);
  if (standardDeviation === undefined) return { method: 'none', n, mean, level };
  if (standardDeviation === 0) return { method: 'constant', n, mean, level, low: mean, high: mean };
  if (n < bootstrapFrom) {
    const { low, high, degreesOfFreedom } = studentInterval(values, { level });
    return { method: 'student-t', n, mean, level, degreesOfFreedom, low, high };
  }
  const drawn = 'replicates' in options ? { replicates: options.replicates() } : options;
  const { low, high, resamples } = bcaMeanInterval(values, { level, ...drawn });
  return { method: 'bca', n, mean, level, resamples, low, high };
}
