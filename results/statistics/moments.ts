import { mean as correctedMean } from 'simple-statistics';
import { checkValues } from './check-values.js';

/** Mean and spread of a sample. */
export interface Moments {
  readonly n: number;
  readonly mean: number;
  /** Standard deviation with divisor n − 1; exactly 0 when all values are equal; absent for one value. */
  readonly standardDeviation?: number;
  /** Standard deviation of the mean, standardDeviation / √n; absent for one value. */
  readonly standardError?: number;
}

/**
 * Mean, standard deviation (divisor n − 1) and standard error of values (n), n ≥ 1, in their own unit.
 *
 * @throws RangeError for no values or one that isn't finite.
 */
export function moments(values: ArrayLike<number>): Moments {
  checkValues(values);
  const sample = Array.from(values);
  const n = sample.length;
  const first = sample[0]!;
  const constant = sample.every((value) => value === first);
  const mean = constant ? first : correctedMean(sample);
  if (n === 1) return { n, mean };
  const standardDeviation = deviationFrom(mean, sample);
  return { n, mean, standardDeviation, standardError: standardDeviation / Math.sqrt(n) };
}

/** Scaled by the largest deviation, whose square could underflow or overflow. */
function deviationFrom(mean: number, sample: readonly number[]): number {
  const largest = sample.reduce((most, value) => Math.max(most, Math.abs(value - mean)), 0);
  if (largest === 0) return 0;
  const squares = sample.reduce((sum, value) => sum + ((value - mean) / largest) ** 2, 0);
  return largest * Math.sqrt(squares / (sample.length - 1));
}
