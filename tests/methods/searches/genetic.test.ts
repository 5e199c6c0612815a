import { describe, expect, test } from 'vitest';
import { countDistinctRows, type Designs, rowView } from '../../../harness/designs.js';
import { decode } from '../../../harness/encoding.js';
import { rootStream } from '../../../harness/random.js';
import { makeSpace, type Space, sampleUniform } from '../../../harness/space.js';
import type { Climb, Objective, Table } from '../../../methods/parts.js';
import { genetic } from '../../../methods/searches/genetic.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer, toyTruth } from '../contract.js';
import { describeSearchContract, toyObjective } from './toy-objective.js';

describeSearchContract(genetic, { generations: 20 });

const defaults = genetic.settings.parse({});

function makeProblem(
  space: Space,
  score: (row: Float64Array) => number,
): { table: Table; objective: Objective } {
  const truth = (designs: Designs) =>
    Float64Array.from({ length: designs.rows }, (_, i) => score(rowView(designs, i)));
  const designs = sampleUniform(space, 50, rootStream(7));
  const table = makeTable({ ...makeOffer('mixed'), space, designs, scores: truth(designs) });
  const value: Objective['value'] = (x) => truth(decode(table.encoding, x));
  return { table, objective: { value, believe: (x) => ({ mean: value(x) }) } };
}

describe('genetic.climb(objective, table, batchSize, settings, stream)', () => {
  test.each([1, 2, 3])('finds the all-ones string of OneMax with 30 bits, seed %i', (seed) => {
    const bits = makeSpace(
      Array.from({ length: 30 }, (_, j) => ({ kind: 'category', name: `bit ${j}`, levels: ['0', '1'] })),
    );
    const { table, objective } = makeProblem(bits, (row) => row.reduce((sum, bit) => sum + bit, 0));
    const { designs } = genetic.climb(objective, table, 5, defaults, rootStream(seed)) as Climb;
    expect(Array.from(rowView(designs, 0))).toEqual(Array(30).fill(1));
    expect(countDistinctRows(designs)).toBe(5);
  });

  test.each([1, 2, 3])('comes near the optimum of a 10-d sphere, seed %i', (seed) => {
    const box = makeSpace(
      Array.from({ length: 10 }, (_, j) => ({ kind: 'continuous', name: `x${j}`, low: -5, high: 5 })),
    );
    const { table, objective } = makeProblem(box, (row) => -row.reduce((sum, v) => sum + (v - 1) ** 2, 0));
    const { designs } = genetic.climb(objective, table, 5, defaults, rootStream(seed)) as Climb;
    const best = rowView(designs, 0).reduce((sum, v) => sum + (v - 1) ** 2, 0);
    // A uniform draw lies at 93 on average, and the best of the table at about a third of that.
    expect(best).toBeLessThan(1);
  });

  test('finds the optimum of whole numbers and categories together', () => {
    const table = makeTable(makeOffer('mixed'));
    const { designs } = genetic.climb(toyObjective(table), table, 8, defaults, rootStream(1)) as Climb;
    // The nearest whole numbers to 0.3 of the ranges of "cycles" and "wash" are 4 and 0; solvent 2 is the right one.
    expect(Array.from(rowView(designs, 0)).slice(1)).toEqual([4, 2, 0]);
    expect(rowView(designs, 0)[0]).toBeCloseTo(20 + 0.3 * 70, 0);
  });

  test('keeps its elite, so that the best value of the trace never falls', () => {
    const table = makeTable(makeOffer('sequence'));
    const { trace } = genetic.climb(toyObjective(table), table, 4, defaults, rootStream(2)) as Climb;
    const tops = trace!.map(({ believed }) => believed[0]!);
    expect(tops).toEqual([...tops].sort((a, b) => a - b));
    expect(trace!.map(({ step }) => step)).toEqual([0, 5, 10, 15, 20, 25, 30, 35, 40, 45, 50]);
  });

  test('asks the objective once a generation, for the whole population', () => {
    const table = makeTable(makeOffer('mixed'));
    const objective = toyObjective(table);
    genetic.climb(objective, table, 8, defaults, rootStream(1));
    expect(objective.asked).toEqual({ calls: 52, rows: 8 + 51 * 100 });
  });

  test('without mutation and crossover, it finds nothing that the first generation did not hold', () => {
    const table = makeTable(makeOffer('continuous'));
    const settings = { ...defaults, mutations: 0, crossover: 0 };
    const end = (generations: number) =>
      genetic.climb(toyObjective(table), table, 8, { ...settings, generations }, rootStream(1)) as Climb;
    expect(end(20).designs).toEqual(end(0).designs);
    expect(toyTruth(table.encoding.space, end(0).designs)[0]).toBeLessThan(0);
  });
});
