import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import type { Conservatism, Model } from '../../../methods/parts.js';
import { networkSettings } from '../../../methods/surrogates/network/network-settings.js';
import { trainNetwork } from '../../../methods/surrogates/network/training.js';
import {
  networkEnsembleSurrogate,
  networkSurrogate,
} from '../../../methods/surrogates/network-surrogates.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer } from '../contract.js';
import { heldMemory } from './network/held-memory.js';

const table = makeTable(makeOffer('mixed'));
const quick = networkSettings.parse({ width: 8, steps: 30, batch: 16 });
const conservatism: Conservatism = { rows: 8, steps: 3, stepSize: 0.05, weight: 1 };

describe('networkSurrogate', () => {
  test('fit(table, settings, stream) is trainNetwork, without a spread', async () => {
    const model = await networkSurrogate.fit(table, quick, rootStream(1));
    const network = await trainNetwork(table, quick, rootStream(1));
    expect(model.predict(table.x)).toEqual({ mean: network.predict(table.x) });
  });

  test('fitConservatively(table, settings, conservatism, stream) trains with that conservatism', async () => {
    const model = await networkSurrogate.fitConservatively!(table, quick, conservatism, rootStream(1));
    const network = await trainNetwork(table, quick, rootStream(1), conservatism);
    expect(model.predict(table.x).mean).toEqual(network.predict(table.x));
    expect(model.predict(table.x)).not.toEqual(
      (await networkSurrogate.fit(table, quick, rootStream(1))).predict(table.x),
    );
  });
});

describe('networkEnsembleSurrogate', () => {
  const fitEnsemble = (members: number, held = false): Model | Promise<Model> => {
    const settings = { ...quick, members };
    if (!held) return networkEnsembleSurrogate.fit(table, settings, rootStream(1));
    return networkEnsembleSurrogate.fitConservatively!(table, settings, conservatism, rootStream(1));
  };

  test('has a spread at every row, since its members differ', async () => {
    for (const held of [false, true]) {
      const { spread } = (await fitEnsemble(3, held)).predict(table.x);
      expect(spread!.every((sd) => sd > 0)).toBe(true);
    }
  });

  test('its members don’t change when there is one more', async () => {
    // With 2 members mean and spread give both predictions back: mean ± spread / √2.
    const pair = (await fitEnsemble(2)).predict(table.x);
    const three = (await fitEnsemble(3)).predict(table.x);
    pair.mean.forEach((mean, i) => {
      const half = pair.spread![i]! / Math.SQRT2;
      const third = 3 * three.mean[i]! - 2 * mean;
      const members = [mean - half, mean + half, third];
      const squares = members.reduce((sum, member) => sum + (member - three.mean[i]!) ** 2, 0);
      expect(Math.sqrt(squares / 2)).toBeCloseTo(three.spread![i]!, 10);
    });
  });

  test('is surer between the visible rows than far outside the table', async () => {
    const middling = makeTable(makeOffer('continuous', { rows: 60 }));
    const inside = [...Array(60).keys()].filter((i) =>
      middling.x.values.subarray(3 * i, 3 * i + 3).every((value) => value < 0.6),
    );
    const visible = {
      ...middling,
      x: {
        rows: inside.length,
        columns: 3,
        values: Float64Array.from(inside.flatMap((i) => [...middling.x.values.subarray(3 * i, 3 * i + 3)])),
      },
      scores: Float64Array.from(inside, (i) => middling.scores[i]!),
    };
    const settings = { ...quick, steps: 200, members: 5, learningRate: 0.01 };
    const model = await networkEnsembleSurrogate.fit(visible, settings, rootStream(1));
    const corner = { rows: 1, columns: 3, values: Float64Array.of(1, 1, 1) };
    const near = model.predict(visible.x).spread!;
    const typical = near.reduce((sum, sd) => sum + sd, 0) / near.length;
    expect(model.predict(corner).spread![0]).toBeGreaterThan(2 * typical);
  });

  test('keeps no memory after fit, predict and gradient', async () => {
    const once = async (held: boolean) => {
      const model = await fitEnsemble(2, held);
      model.predict(table.x);
      model.gradient!(table.x, 1);
    };
    await once(true);
    const before = heldMemory('kernel');
    for (const held of [false, true]) await once(held);
    expect(heldMemory('kernel')).toEqual(before);
  });
});
