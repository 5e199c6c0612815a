import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { rowView } from '../../../../harness/designs.js';
import { rootStream } from '../../../../harness/random.js';
import { modelOfEnsemble, modelOfNetwork } from '../../../../methods/surrogates/network/ensemble.js';
import type { Network } from '../../../../methods/surrogates/network/trained-network.js';
import { expectClose } from './expect-close.js';
import { centralDifferences } from './plain-network.js';
import { makeRandomNetwork, relaxedRows } from './random-network.js';

const drawMembers = (count: number, seed: number) =>
  Promise.all(Array.from({ length: count }, (_, m) => makeRandomNetwork(rootStream(seed).split(m))));

/** A network that gives these scores to any rows. */
const constantNetwork = (...scores: number[]): Network => ({
  predict: () => Float64Array.from(scores),
  predictWithGradient: () => {
    throw new Error('not asked for');
  },
});

describe('modelOfNetwork(network)', () => {
  test('predicts a mean without a spread, and the gradient of the mean whatever the weight of a spread', async () => {
    const { network } = await makeRandomNetwork(rootStream(1));
    const model = modelOfNetwork(network);
    const x = relaxedRows(5);
    expect(model.predict(x)).toEqual({ mean: network.predict(x) });
    expect(model.gradient!(x, 3)).toEqual(network.predictWithGradient(x).gradient);
  });
});

describe('modelOfEnsemble(networks)', () => {
  test('predicts the members’ mean and their standard deviation with divisor n − 1', () => {
    const model = modelOfEnsemble([constantNetwork(2, 5), constantNetwork(4, 5), constantNetwork(9, 5)]);
    // By hand: (2 + 4 + 9) / 3 = 5; √((9 + 1 + 16) / 2) = √13.
    const { mean, spread } = model.predict(relaxedRows(2));
    expect(Array.from(mean)).toEqual([5, 5]);
    expectClose(spread!, [Math.sqrt(13), 0], 1e-15);
  });

  test('gradient(x, w) is that of mean − w · spread, by central differences', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.record({
          count: fc.integer({ min: 2, max: 5 }),
          seed: fc.nat(),
          weight: fc.constantFrom(0, 0.5, 1, 4),
          rows: fc.constantFrom(1, 3),
        }),
        async ({ count, seed, weight, rows }) => {
          const members = await drawMembers(count, seed);
          const x = relaxedRows(rows, seed);
          const gradient = modelOfEnsemble(members.map(({ network }) => network)).gradient!(x, weight);
          const bound = (row: Float64Array) => {
            const scores = members.map(({ plainScore }) => plainScore(row));
            const mean = scores.reduce((sum, score) => sum + score, 0) / count;
            const squares = scores.reduce((sum, score) => sum + (score - mean) ** 2, 0);
            return mean - weight * Math.sqrt(squares / (count - 1));
          };
          for (let i = 0; i < rows; i++) {
            expectClose(rowView(gradient, i), centralDifferences(rowView(x, i), bound), 2e-5, `row ${i}`);
          }
        },
      ),
      { seed: 20260, numRuns: 25 },
    );
  });

  test('gradient(x, w) is the mean’s where all members agree', async () => {
    const { network } = await makeRandomNetwork(rootStream(3));
    const x = relaxedRows(20);
    const expected = network.predictWithGradient(x).gradient.values;
    for (const members of [2, 3, 7]) {
      const model = modelOfEnsemble(Array.from({ length: members }, () => network));
      expect(model.predict(x).spread!.every((spread) => spread === 0)).toBe(true);
      expectClose(model.gradient!(x, 10).values, expected, 1e-12, `${members} members`);
    }
  });
});
