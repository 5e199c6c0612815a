import type { Stream } from '../../harness/random.js';
import { checkCount } from './check-values.js';
import { moments } from './moments.js';

/** Rows of draws kept for use again, at two bytes each. */
const mostKept = 2 ** 24;

/** Draws beyond this many rows are made again whenever they are needed. */
const mostRows = 2 ** 16;

/**
 * The resamples of a bootstrap, drawn once and used for every score of one sample size: scores that are equal have
 * equal replicates, and a thousand scores cost one set of random numbers.
 */
export class Resampler {
  readonly resamples: number;
  readonly #stream: Stream;
  readonly #kept = new Map<number, Uint16Array>();
  #rowsKept = 0;

  /** @throws RangeError for fewer than one resample. */
  constructor(resamples: number, stream: Stream) {
    checkCount(resamples, 'resamples');
    this.resamples = resamples;
    this.#stream = stream;
  }

  /**
   * For each resample of values (n), n ≥ 1, its mean minus the mean of the values; (resamples). Costs resamples · n.
   *
   * @throws RangeError for no values or one that isn't finite.
   */
  meanDeviations(values: ArrayLike<number>): Float64Array {
    const { n, mean } = moments(values);
    const deviations = Float64Array.from(values, (value) => value - mean);
    const means = new Float64Array(this.resamples);
    const kept = this.#draws(n);
    if (kept === undefined) {
      const stream = this.#open();
      for (let b = 0; b < this.resamples; b++) {
        let sum = 0;
        for (let i = 0; i < n; i++) sum += deviations[Math.floor(stream.uniform() * n)]!;
        means[b] = sum / n;
      }
      return means;
    }
    for (let b = 0; b < this.resamples; b++) means[b] = sumDrawn(deviations, kept, b * n, n) / n;
    return means;
  }

  /** The rows of all resamples of n, one resample after another; `undefined` where they would take too much room. */
  #draws(n: number): Uint16Array | undefined {
    const known = this.#kept.get(n);
    if (known !== undefined) return known;
    const total = n * this.resamples;
    if (n > mostRows || this.#rowsKept + total > mostKept) return undefined;
    const stream = this.#open();
    const rows = new Uint16Array(total);
    for (let k = 0; k < total; k++) rows[k] = Math.floor(stream.uniform() * n);
    this.#kept.set(n, rows);
    this.#rowsKept += total;
    return rows;
  }

  #open(): Stream {
    return this.#stream.split('seeds drawn');
  }
}

/** Four sums at a time, which do not wait for one another. */
function sumDrawn(values: Float64Array, rows: Uint16Array, from: number, count: number): number {
  let [first, second, third, fourth] = [0, 0, 0, 0];
  const end = from + count;
  let k = from;
  for (; k + 3 < end; k += 4) {
    first += values[rows[k]!]!;
    second += values[rows[k + 1]!]!;
    third += values[rows[k + 2]!]!;
    fourth += values[rows[k + 3]!]!;
  }
  for (; k < end; k++) first += values[rows[k]!]!;
  return first + second + third + fourth;
}
