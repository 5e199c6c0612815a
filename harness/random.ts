import { createHash } from 'node:crypto';
import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';

/** One step of a stream's name. */
export type StreamKey = string | number;

/**
 * A named, seeded stream of random numbers.
 *
 * A stream is fixed by its path of keys alone: `split` never looks at how many numbers were drawn before, so
 * adding a method, a seed or one more draw somewhere never changes the numbers of another stream.
 */
export interface Stream {
  /** The path of keys that fixes this stream; `openStream(stream.path)` makes it again from its start. */
  readonly path: string;
  /** Uniform on [0, 1), 53 random bits. */
  uniform(): number;
  /** Uniform integer in 0 … limit − 1; `limit` is a whole number of at least 1. */
  below(limit: number): number;
  /** Standard normal (polar method, Marsaglia & Bray 1964). */
  normal(): number;
  /** A child stream, independent of this one and of every child with another name. */
  split(...keys: StreamKey[]): Stream;
}

/** Opens the stream of a plan's seed; every other stream of a rehearsal is split from it. */
export function rootStream(seed: number): Stream {
  return openStream(JSON.stringify([seed]));
}

/**
 * Opens the stream with the given path, from its start.
 *
 * The state of the generator (xoroshiro128+, Blackman & Vigna 2018) is the first 128 bits of the path's SHA-256,
 * so paths that differ in one character give unrelated streams.
 */
export function openStream(path: string): Stream {
  return new HashedStream(path);
}

/** `count` different whole numbers from 0 … limit − 1, in random order; all of them when `count` ≥ `limit`. */
export function sampleWithout(stream: Stream, limit: number, count: number): number[] {
  const order = Array.from({ length: limit }, (_, i) => i);
  const taken = Math.min(count, limit);
  for (let i = 0; i < taken; i++) {
    const j = i + stream.below(limit - i);
    const swap = order[i]!;
    order[i] = order[j]!;
    order[j] = swap;
  }
  return order.slice(0, taken);
}

/** Puts the values into random order, in place (Fisher & Yates 1938, as Durstenfeld 1964), and returns them. */
export function shuffleInPlace<T extends { length: number; [index: number]: number }>(
  values: T,
  stream: Stream,
): T {
  for (let i = values.length - 1; i > 0; i--) {
    const j = stream.below(i + 1);
    const swap = values[i]!;
    values[i] = values[j]!;
    values[j] = swap;
  }
  return values;
}

class HashedStream implements Stream {
  readonly path: string;
  readonly #generator: RandomGenerator;
  #spareNormal: number | undefined;

  constructor(path: string) {
    this.path = path;
    const digest = createHash('sha256').update(path).digest();
    const state = [0, 4, 8, 12].map((offset) => digest.readInt32LE(offset));
    this.#generator = xoroshiro128plusFromState(state);
  }

  uniform(): number {
    return uniformFloat64(this.#generator);
  }

  below(limit: number): number {
    return limit <= 1 ? 0 : uniformInt(this.#generator, 0, limit - 1);
  }

  normal(): number {
    if (this.#spareNormal !== undefined) {
      const spare = this.#spareNormal;
      this.#spareNormal = undefined;
      return spare;
    }
    let u: number;
    let v: number;
    let square: number;
    do {
      u = 2 * this.uniform() - 1;
      v = 2 * this.uniform() - 1;
      square = u * u + v * v;
    } while (square >= 1 || square === 0);
    const scale = Math.sqrt((-2 * Math.log(square)) / square);
    this.#spareNormal = v * scale;
    return u * scale;
  }

  split(...keys: StreamKey[]): Stream {
    const path = JSON.parse(this.path) as StreamKey[];
    return new HashedStream(JSON.stringify([...path, ...keys]));
  }
}
