import normal from '@stdlib/stats-base-dists-normal';
import { checkCount, checkShare } from './check-values.js';

/** A share with its interval. */
export interface WilsonInterval {
  readonly method: 'wilson';
  readonly successes: number;
  readonly trials: number;
  /** successes / trials. */
  readonly share: number;
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Score interval of a share (Wilson 1927), without a continuity correction. Unlike p ± z √(p(1 − p)/n) it stays within
 * [0, 1], and keeps a width where no trial or every trial succeeded.
 *
 * @param options.successes 0 … trials.
 * @param options.trials at least 1.
 * @param options.level confidence, in (0, 1); 0.95 unless given.
 * @throws RangeError for counts that aren't whole numbers in their range, or a level outside (0, 1).
 */
export function wilsonInterval(options: {
  readonly successes: number;
  readonly trials: number;
  readonly level?: number;
}): WilsonInterval {
  const { successes, trials, level = 0.95 } = options;
  checkCount(trials, 'trials');
  checkCount(successes, 'successes', 0);
  if (successes > trials) throw new RangeError(`${successes} successes in ${trials} trials`);
  checkShare(level, 'level');
  const share = successes / trials;
  const z = normal.quantile((1 + level) / 2, 0, 1);
  const shrink = 1 + z ** 2 / trials;
  const centre = (share + z ** 2 / (2 * trials)) / shrink;
  const margin = (z / shrink) * Math.sqrt((share * (1 - share)) / trials + (z / (2 * trials)) ** 2);
  const low = successes === 0 ? 0 : centre - margin;
  const high = successes === trials ? 1 : centre + margin;
  return { method: 'wilson', successes, trials, share, level, low, high };
}
