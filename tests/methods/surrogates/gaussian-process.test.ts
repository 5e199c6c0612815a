import { describe, expect, test } from 'vitest';
import { type Designs, takeRows } from '../../../harness/designs.js';
import { encode, makeEncoding } from '../../../harness/encoding.js';
import { rootStream } from '../../../harness/random.js';
import { makeSpace, sampleUniform } from '../../../harness/space.js';
import type { Table } from '../../../methods/parts.js';
import { gaussianProcessSurrogate } from '../../../methods/surrogates/gaussian-process.js';

function makeTableOf(columns: number, rows: number, truth: (row: Float64Array) => number): Table {
  const space = makeSpace(
    Array.from({ length: columns }, (_, j) => ({
      kind: 'continuous' as const,
      name: `c${j}`,
      low: 0,
      high: 2,
    })),
  );
  const encoding = makeEncoding(space);
  const designs: Designs = sampleUniform(space, rows, rootStream(1));
  const scores = Float64Array.from({ length: rows }, (_, i) =>
    truth(designs.values.subarray(i * columns, (i + 1) * columns)),
  );
  return { encoding, designs, x: encode(encoding, designs), scores };
}

const fitTo = (table: Table, settings: object = {}) =>
  gaussianProcessSurrogate.fit(table, gaussianProcessSurrogate.settings.parse(settings), rootStream(9));

describe('gaussianProcessSurrogate.fit(table, settings, stream)', () => {
  test('predicts held-out scores of a smooth function in score units', async () => {
    const truth = (row: Float64Array) => 1000 + 50 * Math.sin(3 * row[0]!) + 20 * row[1]!;
    const model = await fitTo(makeTableOf(2, 60, truth), { starts: 2 });
    const more = makeTableOf(2, 80, truth);
    const held = takeRows(more.x, [60, 65, 70, 75, 79]);
    const { mean, spread } = model.predict(held);
    [60, 65, 70, 75, 79].forEach((i, k) => {
      expect(Math.abs(mean[k]! - more.scores[i]!)).toBeLessThan(3);
      expect(spread![k]).toBeLessThan(5);
    });
  });

  test('the spread read late is that of the rows asked for, even if the caller has moved them since', async () => {
    const table = makeTableOf(2, 15, (row) => row[0]!);
    const model = await fitTo(table, { starts: 1 });
    const asked = { rows: 1, columns: 2, values: Float64Array.of(0.3, 0.9) };
    const early = model.predict(asked).spread![0];
    const prediction = model.predict(asked);
    asked.values.fill(5);
    expect(prediction.spread![0]).toBe(early);
  });

  test('constant scores are predicted everywhere', async () => {
    const model = await fitTo(makeTableOf(2, 10, () => 7));
    const { mean, spread } = model.predict(makeTableOf(2, 30, () => 0).x);
    mean.forEach((value, i) => {
      expect(value).toBeCloseTo(7, 9);
      expect(Number.isFinite(spread![i]!)).toBe(true);
    });
  });

  test.each([
    ['one row', makeTableOf(2, 1, () => 3)],
    ['two rows', makeTableOf(2, 2, (row) => row[0]!)],
    ['2,000 columns under one shared length scale', makeTableOf(2000, 12, (row) => row[0]!)],
  ])('gives finite predictions for a table of %s', async (_, table) => {
    const model = await fitTo(table);
    const { mean, spread } = model.predict(table.x);
    expect([...mean, ...spread!, ...model.gradient!(table.x, 1).values].every(Number.isFinite)).toBe(true);
  });

  test('a table above mostRows is predicted from its better half and a seeded draw, the same each time', async () => {
    const table = makeTableOf(2, 80, (row) => row[0]! - row[1]!);
    const settings = { mostRows: 20, fitRows: 30, starts: 1 };
    const first = (await fitTo(table, settings)).predict(table.x);
    expect((await fitTo(table, settings)).predict(table.x).mean).toEqual(first.mean);
    const best = table.scores.indexOf(Math.max(...table.scores));
    expect(Math.abs(first.mean[best]! - table.scores[best]!)).toBeLessThan(0.1);
  });
});
