import { describe, expect, test } from 'vitest';
import { countDistinctRows, matrixFromRows, rowKey, rowView } from '../../../harness/designs.js';
import { decode, encode } from '../../../harness/encoding.js';
import { OnebatchError } from '../../../harness/errors.js';
import { rootStream } from '../../../harness/random.js';
import { makeSpace } from '../../../harness/space.js';
import type { Climb, Objective } from '../../../methods/parts.js';
import { cmaEs } from '../../../methods/searches/cma-es.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer, toyTruth } from '../contract.js';
import { describeSearchContract, toyObjective } from './toy-objective.js';

describeSearchContract(cmaEs, { generations: 25 });

const defaults = cmaEs.settings.parse({});

describe('cmaEs.climb(objective, table, batchSize, settings, stream)', () => {
  test.each(['continuous', 'mixed', 'sequence', 'few rows'] as const)(
    'finds the optimum of the toy truth: %s',
    (kind) => {
      const offer = makeOffer(kind);
      const table = makeTable(offer);
      const { designs } = cmaEs.climb(toyObjective(table), table, 8, defaults, rootStream(1)) as Climb;
      const best = toyTruth(offer.space, designs)[0]!;
      // The nearest whole numbers to 0.3 of the ranges of "cycles" and "wash" are 4 and 0.
      const top = kind === 'mixed' || kind === 'few rows' ? -((3 / 11 - 0.3) ** 2) - 0.09 : 0;
      expect(top - best).toBeLessThan(1e-8);
      expect(countDistinctRows(designs)).toBe(8);
    },
  );

  test('reaches an optimum in a corner of the box, by mirroring at the bounds', () => {
    const table = makeTable(makeOffer('continuous'));
    const sum: Objective = {
      value: (x) => Float64Array.from({ length: x.rows }, (_, i) => rowView(x, i).reduce((a, b) => a + b, 0)),
      believe: (x) => ({ mean: new Float64Array(x.rows) }),
    };
    const { designs } = cmaEs.climb(sum, table, 1, defaults, rootStream(1)) as Climb;
    expect(sum.value(encode(table.encoding, designs))[0]).toBeGreaterThan(3 - 1e-6);
  });

  test('shows the objective whole populations of encoded designs only', () => {
    const table = makeTable(makeOffer('mixed'));
    const toy = toyObjective(table);
    const strict: Objective = {
      ...toy,
      value(x) {
        const design = rowView(decode(table.encoding, x), 0);
        const cycles = table.encoding.blocks[1]!;
        expect(x.values[cycles.offset]).toBe((design[1]! - 1) / 11);
        const solvent = Array.from(rowView(x, 0).subarray(2, 5));
        expect([...solvent].sort()).toEqual([0, 0, 1]);
        return toy.value(x);
      },
    };
    cmaEs.climb(strict, table, 8, defaults, rootStream(1));
    // The start, then 100 generations of 4 runs of 4 + ⌊3 ln 6⌋ = 9 designs.
    expect(toy.asked).toEqual({ calls: 101, rows: 8 + 100 * 4 * 9 });
  });

  test('more generations never lower the best value, and the trace climbs', () => {
    const table = makeTable(makeOffer('mixed'));
    const best = (generations: number) => {
      const settings = { ...defaults, generations };
      const { designs, trace } = cmaEs.climb(toyObjective(table), table, 4, settings, rootStream(1)) as Climb;
      const tops = trace!.map(({ believed }) => believed[0]!);
      expect(tops).toEqual([...tops].sort((a, b) => a - b));
      return toyTruth(table.encoding.space, designs)[0]!;
    };
    const bests = [0, 5, 20, 60].map(best);
    expect(bests).toEqual([...bests].sort((a, b) => a - b));
  });

  test('without generations, it gives the visible designs that the model likes, best first', () => {
    const offer = makeOffer('sequence', { batchSize: 4 });
    const table = makeTable(offer);
    const settings = { ...defaults, generations: 0 };
    const { designs } = cmaEs.climb(toyObjective(table), table, 4, settings, rootStream(1)) as Climb;
    const visible = new Set(Array.from({ length: offer.designs.rows }, (_, i) => rowKey(offer.designs, i)));
    expect(Array.from({ length: 4 }, (_, i) => visible.has(rowKey(designs, i)))).toEqual(Array(4).fill(true));
  });

  test('climbs thousands of encoded features with a diagonal covariance', () => {
    const letters = ['A', 'C', 'G', 'T'];
    const space = makeSpace(
      Array.from({ length: 500 }, (_, j) => ({ kind: 'category', name: `${j}`, levels: letters })),
    );
    const offer = makeOffer('sequence');
    const designs = matrixFromRows([new Float64Array(500), new Float64Array(500).fill(1)]);
    const table = makeTable({ ...offer, space, designs, scores: toyTruth(space, designs) });
    const settings = { ...defaults, generations: 30, starts: 1 };
    const climb = cmaEs.climb(toyObjective(table), table, 4, settings, rootStream(1)) as Climb;
    expect(toyTruth(space, climb.designs)[0]).toBeGreaterThan(Math.max(...table.scores) + 5);
  });

  test('refuses a model that gives NaN, with the code "numeric"', () => {
    const table = makeTable(makeOffer('continuous'));
    const broken: Objective = {
      value: (x) => new Float64Array(x.rows).fill(Number.NaN),
      believe: (x) => ({ mean: new Float64Array(x.rows) }),
    };
    expect(() => cmaEs.climb(broken, table, 4, defaults, rootStream(1))).toThrow(OnebatchError);
  });

  test('refuses a population of 1 to 3', () => {
    expect([0, 1, 3, 4].map((population) => cmaEs.settings.safeParse({ population }).success)).toEqual([
      true,
      false,
      false,
      true,
    ]);
  });
});
