import { beforeAll, describe, expect, test } from 'vitest';
import { rowView } from '../../../../harness/designs.js';
import { rootStream } from '../../../../harness/random.js';
import { useBackend } from '../../../../methods/surrogates/network/backend.js';
import { expectClose } from './expect-close.js';
import { everywhere, heldMemory } from './held-memory.js';
import { centralDifferences } from './plain-network.js';
import { encoding, makeRandomNetwork, type RandomNetwork, relaxedRows } from './random-network.js';

describe.each(everywhere)('on the backend %s', (backend) => {
  let network: RandomNetwork['network'];
  let plainScore: RandomNetwork['plainScore'];
  beforeAll(async () => {
    await useBackend(backend);
    ({ network, plainScore } = await makeRandomNetwork(rootStream(1)));
  });

  describe.each([1, 7])('a network with %i rows', (rows) => {
    const x = relaxedRows(rows);
    const expected = () => Array.from({ length: rows }, (_, i) => plainScore(rowView(x, i)));

    test('predict(x) gives mean + deviation · output of the scaled rows', () => {
      expectClose(network.predict(x), expected(), 1e-6);
    });

    test('predictWithGradient(x) gives the same scores, and gradients by the encoded features in score units', () => {
      const { scores, gradient } = network.predictWithGradient(x);
      expectClose(scores, expected(), 1e-6);
      expect([gradient.rows, gradient.columns]).toEqual([rows, encoding.width]);
      for (let i = 0; i < rows; i++) {
        expectClose(rowView(gradient, i), centralDifferences(rowView(x, i), plainScore), 5e-6, `row ${i}`);
      }
    });

    test('neither changes the rows, nor keeps memory', () => {
      const before = x.values.slice();
      const held = heldMemory(backend);
      network.predict(x);
      network.predictWithGradient(x);
      expect(x.values).toEqual(before);
      expect(heldMemory(backend)).toEqual(held);
    });
  });

  test('predict(x) of no rows is empty', () => {
    expect(network.predict(relaxedRows(0))).toHaveLength(0);
  });
});
