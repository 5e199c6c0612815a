import { beforeAll, describe, expect, test } from 'vitest';
import { copyMatrix, type Matrix, rowView } from '../../../../harness/designs.js';
import { encode } from '../../../../harness/encoding.js';
import { rootStream } from '../../../../harness/random.js';
import { sampleUniform } from '../../../../harness/space.js';
import { ascentStep } from '../../../../methods/ascent-step.js';
import type { Conservatism, Table } from '../../../../methods/parts.js';
import { useBackend } from '../../../../methods/surrogates/network/backend.js';
import { networkSettings } from '../../../../methods/surrogates/network/network-settings.js';
import type { Network } from '../../../../methods/surrogates/network/trained-network.js';
import { trainNetwork } from '../../../../methods/surrogates/network/training.js';
import { makeTable, scoreScale } from '../../../../methods/table.js';
import { makeOffer, toyTruth } from '../../contract.js';
import { expectClose } from './expect-close.js';
import { everywhere, heldMemory } from './held-memory.js';
import { trainPlainly } from './plain-training.js';

const settings = networkSettings.parse({ width: 16, steps: 300, batch: 16, learningRate: 0.01 });
const tableOf = (rows: number, kind: 'mixed' | 'continuous' = 'mixed'): Table =>
  makeTable(makeOffer(kind, { rows }));
const withScores = (table: Table, scores: Float64Array): Table => ({ ...table, scores });

describe.each(everywhere)('on the backend %s', (backend) => {
  beforeAll(() => useBackend(backend));

  describe('trainNetwork(table, settings, stream)', () => {
    test('predicts a learnable truth at rows it has not seen', async () => {
      const table = tableOf(200);
      const network = await trainNetwork(table, settings, rootStream(1));
      const { space } = table.encoding;
      const fresh = sampleUniform(space, 200, rootStream(2));
      const truth = toyTruth(space, fresh);
      const explained =
        1 - meanSquare(network.predict(encode(table.encoding, fresh)), truth) / variance(truth);
      expect(explained).toBeGreaterThan(0.85);
    });

    test('comes nearer to the table with more steps', async () => {
      const table = tableOf(60);
      const errors: number[] = [];
      for (const steps of [1, 30, 300]) {
        const network = await trainNetwork(table, { ...settings, steps }, rootStream(1));
        errors.push(meanSquare(network.predict(table.x), table.scores) / variance(table.scores));
      }
      expect(errors[0]).toBeGreaterThan(0.7);
      expect(errors[1]).toBeLessThan(0.6 * errors[0]!);
      expect(errors[2]).toBeLessThan(0.3 * errors[1]!);
    });

    test('is fixed by its stream, and another stream gives another network', async () => {
      const table = tableOf(30);
      const quick = { ...settings, steps: 20 };
      const predict = async (seed: number) =>
        (await trainNetwork(table, quick, rootStream(seed))).predict(table.x);
      const first = await predict(1);
      expect(await predict(1)).toEqual(first);
      expect(await predict(2)).not.toEqual(first);
    });

    test('follows the unit of the scores: scores · 1000 + 5 are predicted as predictions · 1000 + 5', async () => {
      const table = tableOf(30);
      const quick = { ...settings, steps: 20 };
      const stretched = withScores(
        table,
        table.scores.map((score) => 1000 * score + 5),
      );
      const plain = (await trainNetwork(table, quick, rootStream(1))).predict(table.x);
      const actual = (await trainNetwork(stretched, quick, rootStream(1))).predict(table.x);
      expectClose(
        actual,
        plain.map((value) => 1000 * value + 5),
        1e-4,
      );
    });

    test('weight decay makes for smaller slopes', async () => {
      const table = tableOf(30);
      const slope = async (weightDecay: number) => {
        const network = await trainNetwork(table, { ...settings, steps: 150, weightDecay }, rootStream(1));
        return mean(network.predictWithGradient(table.x).gradient.values.map((value) => value ** 2));
      };
      expect(await slope(10)).toBeLessThan(0.5 * (await slope(0)));
    });

    test('predicts constant scores as that constant', async () => {
      const table = withScores(tableOf(30), new Float64Array(30).fill(4));
      const network = await trainNetwork(table, settings, rootStream(1));
      for (const value of network.predict(table.x)) expect(value).toBeCloseTo(4, 1);
    });

    test.each([1, 2, 3])('works on a table of %i rows, fewer than a training step takes', async (rows) => {
      const table = tableOf(rows);
      const network = await trainNetwork(table, settings, rootStream(1));
      for (const prediction of [network.predict(table.x), network.predictWithGradient(table.x).scores]) {
        expectClose(prediction, table.scores, 0.1);
      }
    });

    test('leaves the table as it was and keeps no memory, conservative or not', async () => {
      const table = tableOf(20);
      const before = structuredClone({ x: table.x, scores: table.scores, designs: table.designs });
      const kinds = [undefined, conservative({ target: 1 })];
      for (const conservatism of kinds) {
        await trainNetwork(table, { ...settings, steps: 1 }, rootStream(1), conservatism);
      }
      const held = heldMemory(backend);
      for (const conservatism of kinds) {
        const network = await trainNetwork(table, { ...settings, steps: 5 }, rootStream(1), conservatism);
        network.predictWithGradient(table.x);
      }
      expect(heldMemory(backend)).toEqual(held);
      expect({ x: table.x, scores: table.scores, designs: table.designs }).toEqual(before);
    });
  });

  describe('trainNetwork(…) follows its definition, written out in plain loops with central differences', () => {
    const table = tableOf(7);
    const few = networkSettings.parse({ width: 3, layers: 2, steps: 4, batch: 7, learningRate: 0.02 });
    test.each<[string, Conservatism | undefined]>([
      ['squared error alone', undefined],
      ['a fixed weight', conservative({ weight: 0.7 })],
      ['a weight adjusted to a target', conservative({ weight: 0.7, target: -3 })],
      ['a weight that falls to 0', conservative({ weight: 0.01, target: 50 })],
    ])('%s', async (_, conservatism) => {
      const network = await trainNetwork(table, few, rootStream(5), conservatism);
      const plain = trainPlainly(table, few, rootStream(5), conservatism);
      const expected = Array.from({ length: 7 }, (_, i) => plain(rowView(table.x, i)));
      expectClose(network.predict(table.x), expected, 1e-5);
    });
  });

  describe('trainNetwork(table, settings, stream, conservatism)', () => {
    const table = tableOf(60, 'continuous');
    const overestimationWith = async (changes: Partial<Conservatism>, steps = 300) => {
      const conservatism = conservative(changes);
      const network = await trainNetwork(
        table,
        { ...settings, steps, batch: 60 },
        rootStream(1),
        conservatism,
      );
      return overestimation(table, network, conservatism);
    };

    test('lowers predictions where an ascent leads the more, the larger the weight', async () => {
      const found: number[] = [];
      for (const weight of [0, 0.1, 0.5, 2]) found.push(await overestimationWith({ weight }, 150));
      expect(found).toEqual([...found].sort((a, b) => b - a));
      expect(found[3]).toBeLessThan(0.5 * found[0]!);
    });

    test('with a target holds the over-estimation of mined designs there, from either side', async () => {
      expect(await overestimationWith({ weight: 0 })).toBeGreaterThan(1);
      for (const weight of [0, 1]) {
        const held = await overestimationWith({ weight, target: 0.6 });
        expect(held, `from weight ${weight}`).toBeGreaterThan(0.45);
        expect(held, `from weight ${weight}`).toBeLessThan(0.75);
      }
    });
  });
});

function conservative(changes: Partial<Conservatism>): Conservatism {
  return { rows: 60, steps: 8, stepSize: 0.05, weight: 0.1, ...changes };
}

/** How far predictions rise on the way from the table's rows to the designs mined from them, in score deviations. */
function overestimation(table: Table, network: Network, { steps, stepSize }: Conservatism): number {
  const { deviation } = scoreScale(table.scores);
  const mined: Matrix = copyMatrix(table.x);
  for (let step = 0; step < steps; step++) {
    const { gradient } = network.predictWithGradient(mined);
    const inDeviations = { ...gradient, values: gradient.values.map((slope) => slope / deviation) };
    ascentStep(table.encoding, mined, inDeviations, stepSize);
  }
  return (mean(network.predict(mined)) - mean(network.predict(table.x))) / deviation;
}

function mean(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function variance(values: Float64Array): number {
  return mean(values.map((value) => (value - mean(values)) ** 2));
}

function meanSquare(a: Float64Array, b: Float64Array): number {
  return mean(a.map((value, i) => (value - b[i]!) ** 2));
}
