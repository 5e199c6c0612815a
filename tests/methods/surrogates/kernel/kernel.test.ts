import { describe, expect, test } from 'vitest';
import { OnebatchError } from '../../../../harness/errors.js';
import { rootStream } from '../../../../harness/random.js';
import { takeKernel } from '../../../../methods/surrogates/kernel/kernel.js';
import { placeShape } from '../../../../methods/surrogates/kernel/network-shape.js';
import { networkSettings } from '../../../../methods/surrogates/network/network-settings.js';
import { trainNetwork } from '../../../../methods/surrogates/network/training.js';
import { makeTable } from '../../../../methods/table.js';
import { makeOffer } from '../../contract.js';

describe('takeKernel()', () => {
  test('gives the same kernel each time, with all of its memory free', () => {
    const { arena, call } = takeKernel();
    const first = arena.reserve(1000);
    expect(arena.reserve(8)).toBeGreaterThanOrEqual(first + 1000);
    expect(takeKernel().call).toBe(call);
    expect(takeKernel().arena.reserve(8)).toBe(first);
  });

  test('holds no more memory after thousands of trainings than after the first few', async () => {
    const train = async (seed: number) => {
      const table = makeTable(makeOffer(seed % 2 === 0 ? 'mixed' : 'continuous', { rows: 5 + (seed % 7) }));
      const settings = networkSettings.parse({ width: 4, steps: 2, batch: 4 });
      const network = await trainNetwork(table, settings, rootStream(seed));
      network.predictWithGradient(table.x);
    };
    for (let seed = 0; seed < 14; seed++) await train(seed);
    const held = takeKernel().call.memory.buffer.byteLength;
    for (let seed = 0; seed < 2000; seed++) await train(seed);
    expect(takeKernel().call.memory.buffer.byteLength).toBe(held);
  });
});

describe('Arena', () => {
  test('places numbers and gives copies of them, which later calls leave alone', () => {
    const { arena } = takeKernel();
    const at = arena.place(Float64Array.of(1.5, -2));
    const copy = arena.doubles(at, 2);
    arena.write(at, Float64Array.of(7, 8));
    expect(copy).toEqual(Float64Array.of(1.5, -2));
    expect(arena.doubles(at, 2)).toEqual(Float64Array.of(7, 8));
    expect(arena.floats(arena.place(Float32Array.of(0.5)), 1)).toEqual(Float32Array.of(0.5));
  });

  test('keeps what it holds when its memory grows', () => {
    const { arena, call } = takeKernel();
    const at = arena.place(Int32Array.of(3, 1, 4));
    arena.reserve(call.memory.buffer.byteLength);
    expect([...arena.integers(at, 3)]).toEqual([3, 1, 4]);
  });

  test('refuses what no machine can hold, in words for people', () => {
    const { arena } = takeKernel();
    expect(() => arena.reserve(5e9)).toThrow(OnebatchError);
    expect(() => arena.reserve(5e9)).toThrow(/needs 500\d MB at once.*smaller width or batch/);
    expect(arena.reserve(8)).toBeGreaterThan(0);
  });

  test('gives trained networks that answer the same in turn as one by one', async () => {
    const table = makeTable(makeOffer('mixed', { rows: 30 }));
    const settings = networkSettings.parse({ width: 8, steps: 5 });
    const networks = await Promise.all([1, 2].map((seed) => trainNetwork(table, settings, rootStream(seed))));
    const oneByOne = networks.map((network) => [
      network.predict(table.x),
      network.predictWithGradient(table.x),
      network.predictWithGradient(table.x),
    ]);
    const inTurn = [0, 1, 2].map((question) =>
      networks.map((network) =>
        question === 0 ? network.predict(table.x) : network.predictWithGradient(table.x),
      ),
    );
    expect(inTurn[0]!.map((_, m) => inTurn.map((answers) => answers[m]))).toEqual(oneByOne);
  });

  test('is told true sizes of networks beyond all memory', () => {
    const { call, arena } = takeKernel();
    const shape = placeShape(takeKernel(), { inputs: 100, hidden: new Array<number>(8).fill(4096) });
    const weights = 4 * (100 * 4096 + 7 * 4096 ** 2 + 4096);
    expect(call.parameterBytes(shape)).toBeGreaterThan(weights);
    expect(call.parameterBytes(shape)).toBeLessThan(1.01 * weights);
    const scratch = call.scratchBytes(shape, 50, 128);
    expect(scratch).toBeGreaterThan(49 * weights);
    expect(() => arena.reserve(scratch)).toThrow(/needs \d+ MB at once/);
  });
});
