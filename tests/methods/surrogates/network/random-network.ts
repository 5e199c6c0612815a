import type { Matrix } from '../../../../harness/designs.js';
import { type Encoding, encode, makeEncoding } from '../../../../harness/encoding.js';
import { rootStream, type Stream } from '../../../../harness/random.js';
import { makeSpace, sampleUniform } from '../../../../harness/space.js';
import { makeNetwork } from '../../../../methods/surrogates/network/network.js';
import { freshParameters } from '../../../../methods/surrogates/network/parameters.js';
import { makeScaling } from '../../../../methods/surrogates/network/scaling.js';
import type { Network } from '../../../../methods/surrogates/network/trained-network.js';
import { plainOutput } from './plain-network.js';

/** Columns of all kinds, 7 features. */
export const encoding: Encoding = makeEncoding(
  makeSpace([
    { kind: 'continuous', name: 'heat', low: 20, high: 90 },
    { kind: 'integer', name: 'cycles', low: 1, high: 12 },
    { kind: 'category', name: 'solvent', levels: ['water', 'ethanol', 'toluene'] },
    { kind: 'category', name: 'lid', levels: ['on', 'off'] },
  ]),
);

/** A network of 3 and 5 hidden units with random parameters, and the same in 64-bit floats for one encoded row. */
export interface RandomNetwork {
  readonly network: Network;
  readonly plainScore: (row: ArrayLike<number>) => number;
}

export async function makeRandomNetwork(
  stream: Stream,
  scaling = { mean: 40.1, deviation: 8.3 },
): Promise<RandomNetwork> {
  const parameters = freshParameters(encoding.width, [3, 5], stream);
  const { shifts, factors } = makeScaling(encoding);
  return {
    network: await makeNetwork(encoding, parameters, scaling),
    plainScore: (row) =>
      scaling.mean +
      scaling.deviation *
        plainOutput(
          parameters,
          Array.from(row, (value, j) => (value - shifts[j]!) * factors[j]!),
        ),
  };
}

/** Encoded rows, moved off the designs so that categories are relaxed as a climb relaxes them. */
export function relaxedRows(count: number, seed = 1): Matrix {
  const stream = rootStream(seed).split('rows');
  const x = encode(encoding, sampleUniform(encoding.space, count, stream));
  return { ...x, values: x.values.map((value) => 0.8 * value + 0.2 * stream.uniform()) };
}
