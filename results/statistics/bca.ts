import normal from '@stdlib/stats-base-dists-normal';
import type { Stream } from '../../harness/random.js';
import { checkCount, checkShare, checkValues } from './check-values.js';
import { moments } from './moments.js';
import { quantileSorted } from './quantile.js';

/** Resamples that a bootstrap draws unless told otherwise. */
export const defaultResamples = 10_000;

/** Sums within this share of the size of their terms count as equal, for rounding depends on their order. */
const tieTolerance = 1e-12;

/** How a bootstrap is carried out. */
export interface BcaOptions {
  /** Confidence, in (0, 1); 0.95 unless given. */
  readonly level?: number;
  /** Resamples drawn; 10,000 unless given. */
  readonly resamples?: number;
  readonly stream: Stream;
}

/** A bias-corrected and accelerated bootstrap interval. */
export interface BcaInterval {
  readonly method: 'bca';
  readonly n: number;
  /** The statistic of the sample itself. */
  readonly estimate: number;
  readonly level: number;
  readonly resamples: number;
  readonly low: number;
  readonly high: number;
  /** z₀: the normal quantile of the share of replicates below the estimate. */
  readonly biasCorrection: number;
  /** a: a sixth of the skewness of the statistic's jackknife influence. */
  readonly acceleration: number;
  /** Standard deviation of the replicates. */
  readonly standardError: number;
}

/**
 * BCa interval of any statistic of n observations (Efron 1987; DiCiccio & Efron 1996).
 *
 * The statistic is called with the row numbers of a resample, n of them, some repeated; for the jackknife with n − 1.
 * Costs `resamples` + n + 1 calls.
 *
 * @param n observations, at least 2.
 * @param statistic value for the observations at `rows`; it must not keep or change `rows`.
 * @throws RangeError for n < 2, a level outside (0, 1), or a resample whose statistic isn't finite.
 */
export function bcaInterval(
  n: number,
  statistic: (rows: Uint32Array) => number,
  options: BcaOptions,
): BcaInterval {
  const { level = 0.95, resamples = defaultResamples, stream } = options;
  checkShare(level, 'level');
  checkCount(n, 'observations', 2);
  checkCount(resamples, 'resamples');
  const estimate = statistic(Uint32Array.from({ length: n }, (_, i) => i));
  const jackknife = Float64Array.from({ length: n }, (_, left) =>
    statistic(Uint32Array.from({ length: n - 1 }, (_, i) => (i < left ? i : i + 1))),
  );
  const rows = new Uint32Array(n);
  const replicates = new Float64Array(resamples);
  for (let b = 0; b < resamples; b++) {
    for (let i = 0; i < n; i++) rows[i] = Math.floor(stream.uniform() * n);
    replicates[b] = statistic(rows);
  }
  checkValues([estimate, ...jackknife], 'statistic of the sample and its jackknife');
  checkValues(replicates, 'statistic of the resamples');
  const size = replicates.reduce((most, value) => Math.max(most, Math.abs(value)), Math.abs(estimate));
  return assemble({ n, estimate, jackknife, replicates, tie: tieTolerance * size, level });
}

/**
 * BCa interval of a mean; the same procedure as `bcaInterval`, with the resampling of values (n), n ≥ 2, written out.
 * Shifting all values shifts the interval, and scaling them scales it, to rounding.
 *
 * @throws RangeError for fewer than two values, one that isn't finite, or a level outside (0, 1).
 */
export function bcaMeanInterval(values: ArrayLike<number>, options: BcaOptions): BcaInterval {
  const { level = 0.95 } = options;
  checkShare(level, 'level');
  checkValues(values, 'values', 2);
  const { n, mean } = moments(values);
  const replicates = drawMeans(values, mean, options);
  const deviations = Float64Array.from(values, (value) => value - mean);
  const size = deviations.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const jackknife = deviations.map((deviation) => -deviation / (n - 1));
  const centre = moments(deviations).mean;
  const centred = assemble({ n, estimate: centre, jackknife, replicates, tie: tieTolerance * size, level });
  return { ...centred, estimate: mean, low: mean + centred.low, high: mean + centred.high };
}

/** Means of resamples, minus the mean of the values. */
function drawMeans(
  values: ArrayLike<number>,
  mean: number,
  { resamples = defaultResamples, stream }: BcaOptions,
): Float64Array {
  checkCount(resamples, 'resamples');
  const n = values.length;
  const deviations = Float64Array.from(values, (value) => value - mean);
  const replicates = new Float64Array(resamples);
  for (let b = 0; b < resamples; b++) {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += deviations[Math.floor(stream.uniform() * n)]!;
    replicates[b] = sum / n;
  }
  return replicates;
}

interface Bootstrapped {
  readonly n: number;
  readonly estimate: number;
  readonly jackknife: Float64Array;
  /** Put into order here. */
  readonly replicates: Float64Array;
  readonly tie: number;
  readonly level: number;
}

function assemble({ n, estimate, jackknife, replicates, tie, level }: Bootstrapped): BcaInterval {
  const resamples = replicates.length;
  const biasCorrection = correctBias(replicates, estimate, tie);
  const acceleration = accelerate(jackknife);
  replicates.sort();
  const endpoint = (probability: number): number =>
    quantileSorted(replicates, adjust(probability, biasCorrection, acceleration));
  return {
    method: 'bca',
    n,
    estimate,
    level,
    resamples,
    low: endpoint((1 - level) / 2),
    high: endpoint((1 + level) / 2),
    biasCorrection,
    acceleration,
    standardError: resamples > 1 ? moments(replicates).standardDeviation! : 0,
  };
}

/**
 * z₀ = Φ⁻¹(share of replicates below the estimate), a replicate equal to it counting half. The share is kept half a
 * replicate away from 0 and 1, where z₀ would be infinite.
 */
function correctBias(replicates: Float64Array, estimate: number, tie: number): number {
  let below = 0;
  for (const replicate of replicates) {
    if (replicate < estimate - tie) below += 1;
    else if (replicate <= estimate + tie) below += 0.5;
  }
  const margin = 0.5 / replicates.length;
  return normal.quantile(Math.min(1 - margin, Math.max(margin, below / replicates.length)), 0, 1);
}

/** a = Σ U³ / (6 (Σ U²)^1.5) with U the jackknife's mean minus its values; 0 where they are all equal. */
function accelerate(jackknife: Float64Array): number {
  const { n, mean, standardDeviation } = moments(jackknife);
  if (standardDeviation === 0) return 0;
  const cubes = jackknife.reduce((sum, value) => sum + ((mean - value) / standardDeviation!) ** 3, 0);
  return cubes / (6 * (n - 1) ** 1.5);
}

/** Φ(z₀ + (z₀ + z) / (1 − a(z₀ + z))) with z the normal quantile of the probability. */
function adjust(probability: number, biasCorrection: number, acceleration: number): number {
  const shifted = biasCorrection + normal.quantile(probability, 0, 1);
  const stretch = 1 - acceleration * shifted;
  if (stretch <= 0) return shifted > 0 ? 1 : 0;
  return normal.cdf(biasCorrection + shifted / stretch, 0, 1);
}
