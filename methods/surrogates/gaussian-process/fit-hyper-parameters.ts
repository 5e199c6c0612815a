import { type Stream, sampleWithout } from '../../../harness/random.js';
import { fromLogarithms, type HyperParameters } from './hyper-parameters.js';
import { logMarginalLikelihood, type PairDistances } from './marginal-likelihood.js';
import { type Evaluated, minimizeInBox } from './minimize-in-box.js';

/** The hyper-parameters found, and how good they are. */
export interface FittedHyperParameters {
  readonly hyperParameters: HyperParameters;
  /** Log marginal likelihood plus log prior density (without its constant) at them. */
  readonly value: number;
}

interface Belief {
  /** Mean and deviation of the parameter's logarithm. */
  readonly mean: number;
  readonly deviation: number;
  readonly low: number;
  readonly high: number;
}

/**
 * The log-normal priors and the bounds, one a parameter in the order of `toLogarithms`, for standardized scores.
 *
 * Length scales: logarithm around √2 + ½ log(groups) with deviation √3 (Hvarfner et al. 2024, "Vanilla Bayesian
 * optimization performs great in high dimensions"), held in 0.02 … 1000 √groups. Amplitude: around 1, deviation 1, held
 * in 0.01 … 100. Noise variance: around exp(−4), deviation 2, held in 10⁻⁶ … 4. The last two are common practice.
 */
export function hyperParameterBeliefs(groups: number): readonly Belief[] {
  const half = Math.log(groups) / 2;
  const lengthScale = {
    mean: Math.SQRT2 + half,
    deviation: Math.sqrt(3),
    low: Math.log(0.02),
    high: Math.log(1000) + half,
  };
  return [
    ...Array.from({ length: groups }, () => lengthScale),
    { mean: 0, deviation: 1, low: Math.log(0.01), high: Math.log(100) },
    { mean: -4, deviation: 2, low: Math.log(1e-6), high: Math.log(4) },
  ];
}

/**
 * Maximizes log marginal likelihood plus log prior from several starts: long length scales with little noise, short
 * ones with much, then places drawn from the stream. Start k is the same however many starts there are, so more starts
 * never end lower.
 *
 * @param targets (n), standardized scores
 * @param iterations most quasi-Newton steps from each start
 */
export function fitHyperParameters(
  distances: PairDistances,
  targets: Float64Array,
  starts: number,
  iterations: number,
  stream: Stream,
): FittedHyperParameters {
  const beliefs = hyperParameterBeliefs(distances.groups);
  const low = Float64Array.from(beliefs, (belief) => belief.low);
  const high = Float64Array.from(beliefs, (belief) => belief.high);
  const evaluate = (logarithms: Float64Array): Evaluated => {
    const likelihood = logMarginalLikelihood(distances, targets, logarithms);
    return {
      value: -likelihood.value - logPrior(beliefs, logarithms),
      gradient: () =>
        likelihood
          .gradient()
          .map((g, j) => -g + (logarithms[j]! - beliefs[j]!.mean) / beliefs[j]!.deviation ** 2),
    };
  };
  let best: { point: Float64Array; value: number } | undefined;
  for (let k = 0; k < starts; k++) {
    const start = makeStart(k, distances.groups, stream.split('start', k));
    const end = minimizeInBox(evaluate, start, low, high, iterations);
    if (best === undefined || end.value < best.value) best = end;
  }
  return { hyperParameters: fromLogarithms(best!.point), value: -best!.value };
}

/** `count` row numbers drawn without repetition, in ascending order; all rows when there are no more. */
export function drawRows(rows: number, count: number, stream: Stream): number[] {
  return sampleWithout(stream, rows, count).sort((a, b) => a - b);
}

function logPrior(beliefs: readonly Belief[], logarithms: Float64Array): number {
  return beliefs.reduce(
    (sum, { mean, deviation }, j) => sum - 0.5 * ((logarithms[j]! - mean) / deviation) ** 2,
    0,
  );
}

function makeStart(k: number, groups: number, stream: Stream): Float64Array {
  const half = Math.log(groups) / 2;
  const start = new Float64Array(groups + 2);
  if (k < 2) {
    start.fill(k === 0 ? half : half + Math.log(0.3), 0, groups);
    start[groups + 1] = Math.log(k === 0 ? 0.02 : 0.3);
  } else {
    for (let g = 0; g < groups; g++) start[g] = half + Math.log(0.1) + stream.uniform() * Math.log(50);
    start.set([0.5 * stream.normal(), Math.log(1e-3) + stream.uniform() * Math.log(500)], groups);
  }
  return start;
}
