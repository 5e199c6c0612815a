import { describe, expect, test } from 'vitest';
import { type Matrix, matrixFromRows } from '../../../harness/designs.js';
import { OnebatchError } from '../../../harness/errors.js';
import { rootStream } from '../../../harness/random.js';
import { sequenceSpace } from '../../../harness/space.js';
import { ridgeSurrogate } from '../../../methods/surrogates/ridge.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer } from '../contract.js';

const fitTo = (kind: Parameters<typeof makeOffer>[0], settings: object) =>
  ridgeSurrogate.fit(makeTable(makeOffer(kind)), ridgeSurrogate.settings.parse(settings), rootStream(1));

/** Rows of the mixed space's encoding that stand for no design: heat, cycles, three solvents, wash. */
const relaxed = matrixFromRows([
  [0.1, 0.8, 0.2, 0.5, 0.3, 0.5],
  [0.9, 0.3, 0, 0.9, 0.1, 0.2],
]);

describe('ridgeSurrogate.fit(table, settings, stream)', () => {
  test.each([
    { degree: 1 },
    { degree: 2 },
    { degree: 2, pairwise: true },
    { degree: 2, pairwise: true, penalty: 0.5 },
  ])('has a gradient that agrees with central differences: %o', async (settings) => {
    const model = await fitTo('mixed', settings);
    for (const weight of [0, 1.5]) {
      const value = (x: Matrix) => {
        const { mean, spread } = model.predict(x);
        return mean.map((m, i) => m - weight * spread![i]!);
      };
      const gradient = model.gradient!(relaxed, weight);
      const step = 1e-5;
      relaxed.values.forEach((at, k) => {
        const row = Math.floor(k / relaxed.columns);
        const moved = (to: number) => value({ ...relaxed, values: relaxed.values.with(k, to) })[row]!;
        expect(gradient.values[k]).toBeCloseTo((moved(at + step) - moved(at - step)) / (2 * step), 6);
      });
    }
  });

  test('follows an additive quadratic truth exactly when the penalty is next to nothing', async () => {
    // the continuous offer's truth is −Σ (u − 0.3)²; its noise of 0.05 is left in, so compare with its size
    const model = await fitTo('continuous', { penalty: 1e-6 });
    const { mean, spread } = model.predict(matrixFromRows([[0.3, 0.3, 0.3]]));
    expect(Math.abs(mean[0]!)).toBeLessThan(0.05);
    expect(spread![0]).toBeLessThan(0.2);
  });

  test('refuses more than 5,000 products with how many they would be', () => {
    // 20 sites of 20 levels: 190 pairs × 400
    const space = sequenceSpace(20, 'ACDEFGHIKLMNPQRSTVWY'.split(''));
    const designs = { rows: 2, columns: 20, values: new Float64Array(40) };
    const stream = rootStream(1);
    const table = makeTable({
      space,
      designs,
      scores: Float64Array.of(1, 2),
      batchSize: 1,
      stream,
      budgetSeconds: 1,
    });
    const attempt = () =>
      ridgeSurrogate.fit(table, ridgeSurrogate.settings.parse({ pairwise: true }), stream);
    expect(attempt).toThrow(OnebatchError);
    expect(attempt).toThrow(/76000 products/);
  });
});
