import { describe, expect, test } from 'vitest';
import { type Matrix, rowView } from '../../../harness/designs.js';
import { encode } from '../../../harness/encoding.js';
import { OnebatchError } from '../../../harness/errors.js';
import { rootStream } from '../../../harness/random.js';
import type { Climb, Objective, Table } from '../../../methods/parts.js';
import { gradientAscent } from '../../../methods/searches/gradient-ascent.js';
import { bestVisible, makeTable, scoreScale } from '../../../methods/table.js';
import { makeOffer, type OfferKind } from '../contract.js';

const tableOf = (kind: OfferKind, rows = 40): Table => makeTable(makeOffer(kind, { rows }));

/** −½ Σ (x − peak)² · scale on encoded rows, and its gradient. */
function bowl(peak: readonly number[], scale = 1): Required<Objective> {
  const value = (x: Matrix) =>
    Float64Array.from({ length: x.rows }, (_, i) =>
      rowView(x, i).reduce((sum, v, j) => sum - (scale / 2) * (v - peak[j]!) ** 2, 0),
    );
  return {
    value,
    believe: (x) => ({ mean: value(x) }),
    gradient: (x) => ({ ...x, values: x.values.map((v, k) => scale * (peak[k % x.columns]! - v)) }),
  };
}

function climb(objective: Objective, table: Table, settings: object, batchSize = 3): Climb {
  const chosen = gradientAscent.settings.parse(settings);
  return gradientAscent.climb(objective, table, batchSize, chosen, rootStream(1)) as Climb;
}

describe('gradientAscent.climb(objective, table, batchSize, settings, stream)', () => {
  test('reaches the peak of a bowl inside the box', () => {
    const table = tableOf('continuous');
    const { designs } = climb(bowl([0.2, 0.7, 0.5]), table, { steps: 300, stepSize: 0.03 });
    const x = encode(table.encoding, designs);
    for (let i = 0; i < 3; i++) {
      [0.2, 0.7, 0.5].forEach((share, j) => {
        expect(rowView(x, i)[j]).toBeCloseTo(share, 6);
      });
    }
  });

  test('stops at the bounds where the peak lies beyond, and takes the level with the steepest way up', () => {
    const table = tableOf('mixed');
    const { designs } = climb(bowl([3, -2, 0, 0, 4, 9]), table, { steps: 100, stepSize: 0.1 });
    for (let i = 0; i < 3; i++) expect(Array.from(rowView(designs, i))).toEqual([90, 1, 2, 1]);
  });

  test('takes one step by the gradient in standard deviations of the table’s scores', () => {
    const table = tableOf('continuous');
    const slope = [0.4, -0.3, 0.1];
    const objective: Objective = {
      ...bowl([0, 0, 0]),
      gradient: (x) => ({ ...x, values: x.values.map((_, k) => slope[k % 3]!) }),
    };
    const { designs } = climb(objective, table, { steps: 1, stepSize: 0.01 }, 1);
    const start = encode(table.encoding, bestVisible(table, 1)).values;
    const { deviation } = scoreScale(table.scores);
    encode(table.encoding, designs).values.forEach((value, j) => {
      const moved = start[j]! + (0.01 * Math.sqrt(3) * slope[j]!) / deviation;
      expect(value).toBeCloseTo(Math.min(1, Math.max(0, moved)), 12);
    });
  });

  test('climbs the same way whatever the unit of the scores', () => {
    const table = tableOf('mixed');
    const stretched = { ...table, scores: table.scores.map((score) => 64 * score) };
    const peak = [0.2, 0.7, 0, 1, 0, 0.4];
    const settings = { steps: 5, stepSize: 0.05 };
    expect(climb(bowl(peak, 64), stretched, settings).designs).toEqual(
      climb(bowl(peak), table, settings).designs,
    );
  });

  test('starts from the best visible designs, and again from the best where the table is short', () => {
    const table = tableOf('mixed', 2);
    const { designs } = climb(bowl([0, 0, 0, 0, 0, 0]), table, { steps: 0 }, 5);
    expect(designs).toEqual(bestVisible(table, 5));
    expect(rowView(designs, 2)).toEqual(rowView(designs, 0));
  });

  test('records step 0, every traceEvery-th and the last', () => {
    const steps = (settings: object) =>
      climb(bowl([0, 0, 0]), tableOf('continuous'), settings).trace!.map(({ step }) => step);
    expect(steps({ steps: 10, traceEvery: 4 })).toEqual([0, 4, 8, 10]);
    expect(steps({ steps: 8, traceEvery: 4 })).toEqual([0, 4, 8]);
    expect(steps({ steps: 0 })).toEqual([0]);
  });

  test('records what is believed of the designs themselves, not of their relaxed rows', () => {
    const table = tableOf('sequence');
    const objective = bowl(Array.from({ length: 24 }, (_, k) => (k % 4 === 1 ? 1 : 0)));
    const { designs, trace } = climb(objective, table, { steps: 6, stepSize: 0.02, traceEvery: 2 });
    for (const step of trace!) {
      expect(step.believed).toEqual(objective.value(encode(table.encoding, step.designs)));
    }
    expect(trace!.at(-1)!.designs).toEqual(designs);
  });

  test('leaves the table as it was', () => {
    const table = tableOf('mixed');
    const before = structuredClone({ designs: table.designs, x: table.x, scores: table.scores });
    climb(bowl([1, 1, 1, 0, 0, 1]), table, { steps: 3 });
    expect({ designs: table.designs, x: table.x, scores: table.scores }).toEqual(before);
  });

  test('refuses an objective without a gradient with "method-cannot"', () => {
    const { value, believe } = bowl([0, 0, 0]);
    const attempt = () => climb({ value, believe }, tableOf('continuous'), {});
    expect(attempt).toThrow(OnebatchError);
    expect(attempt).toThrow(expect.objectContaining({ code: 'method-cannot' }));
  });
});
