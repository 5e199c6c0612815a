import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { rootStream } from '../../harness/random.js';
import { type Column, sampleUniform } from '../../harness/space.js';
import type { Task } from '../../harness/task.js';
import { recipe } from '../../tasks/recipe.js';
import { describeTaskContract } from './contract.js';
import { largest, scoreOf, summarize } from './sequences.js';

type Settings = Parameters<typeof recipe.settings.parse>[0];

const make = (settings: Settings, seed: number): Task =>
  recipe.make(recipe.settings.parse(settings), rootStream(seed).split('recipe test'));

const seeds = Array.from({ length: 20 }, (_, i) => i + 1);

/** Values of a column other than `but`: all of a category or whole-number column, 41 even steps of a continuous one. */
function otherValues(column: Column, but: number): number[] {
  if (column.kind === 'category') return [...column.levels.keys()].filter((level) => level !== but);
  const count = column.kind === 'integer' ? column.high - column.low + 1 : 41;
  const step = (column.high - column.low) / (count - 1);
  return Array.from({ length: count }, (_, k) => column.low + k * step).filter((value) => value !== but);
}

/** Scores of `design` with column `j` set to each value in turn. */
function scoresAlong(task: Task, design: Float64Array, j: number, values: readonly number[]): Float64Array {
  return task.truth(matrixFromRows(values.map((value) => design.with(j, value))));
}

describeTaskContract(
  'recipe',
  recipe,
  [
    {},
    { interaction: 0, ruggedness: 0 },
    { interaction: 1, ruggedness: 1, levels: 2 },
    { continuous: 1, integers: 0, categories: 0 },
    { continuous: 12, integers: 6, categories: 5, levels: 7 },
  ],
  { instances: 3 },
);

describe('recipe.make(settings, stream)', () => {
  test('has the asked columns of each kind, in that order, with units where they are real dials', () => {
    const { columns } = make({ continuous: 9, integers: 5, categories: 5, levels: 3 }, 1).space;
    const kinds = columns.map(({ kind }) => kind);
    expect(kinds).toEqual([
      ...new Array<string>(9).fill('continuous'),
      ...new Array<string>(5).fill('integer'),
      ...new Array<string>(5).fill('category'),
    ]);
    expect(columns[1]).toEqual({ kind: 'continuous', name: 'temperature', low: 14, high: 32, unit: '°C' });
    expect(columns[8]).toEqual({ kind: 'continuous', name: 'dial9', low: 0, high: 1 });
    expect(columns[13]).toEqual({ kind: 'integer', name: 'count5', low: 0, high: 20 });
    expect(columns[14]).toEqual({ kind: 'category', name: 'cultivar', levels: ['A', 'B', 'C'] });
    expect(columns[18]).toEqual({ kind: 'category', name: 'choice5', levels: ['A', 'B', 'C'] });
  });

  test('yields exactly 100 points at the optimum, and from 0 to less than 100 elsewhere', () => {
    const settings = fc.record({
      continuous: fc.integer({ min: 1, max: 6 }),
      integers: fc.nat(4),
      categories: fc.nat(3),
      levels: fc.integer({ min: 2, max: 6 }),
      interaction: fc.double({ min: 0, max: 1, noNaN: true }),
      ruggedness: fc.double({ min: 0, max: 1, noNaN: true }),
    });
    fc.assert(
      fc.property(settings, fc.nat(1e6), (asked, seed) => {
        const task = make(asked, seed);
        expect(task.optimum).toMatchObject({ value: 100, known: 'exact' });
        expect(scoreOf(task, task.optimum.design!)).toBe(100);
        const scores = task.truth(sampleUniform(task.space, 100, rootStream(seed)));
        expect(scores.every((score) => score >= 0 && score < 100)).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  test.each([{}, { interaction: 1, ruggedness: 1 }, { interaction: 0, ruggedness: 0 }])(
    'with %j loses yield whenever any one column leaves the optimum, and much in its worst place',
    (settings) => {
      for (const seed of seeds) {
        const task = make(settings, seed);
        const design = task.optimum.design!;
        task.space.columns.forEach((column, j) => {
          const scores = scoresAlong(task, design, j, otherValues(column, design[j]!));
          expect(largest(scores), column.name).toBeLessThan(100);
          expect(Math.min(...scores), column.name).toBeLessThan(99);
        });
      }
    },
  );

  test('lets every climb column by column reach the optimum when columns are apart and smooth, else traps most', () => {
    const climb = (task: Task, seed: number): number => {
      let design: Float64Array = Float64Array.from(sampleUniform(task.space, 1, rootStream(seed)).values);
      for (let step = 0; step < 10 * task.space.columns.length; step++) {
        const j = step % task.space.columns.length;
        const values = otherValues(task.space.columns[j]!, Number.NaN);
        const scores = scoresAlong(task, design, j, values);
        design = design.with(j, values[scores.indexOf(largest(scores))]!);
      }
      return scoreOf(task, design);
    };
    // 41 steps a dial miss its ideal by up to 1/80 of the range: a loss of well under 2 points over all dials.
    const reached = (settings: Settings) =>
      seeds.filter((seed) => climb(make(settings, seed), seed) > 98).length;
    expect(reached({ interaction: 0, ruggedness: 0 })).toBe(seeds.length);
    expect(reached({})).toBeLessThan(seeds.length / 2);
  });

  test('keeps the optimum of every numeric column off the centre and off the ends', () => {
    for (const seed of seeds) {
      const { space, optimum } = make({ integers: 0, categories: 0, continuous: 8 }, seed);
      space.columns.forEach((column, j) => {
        if (column.kind === 'category') return;
        const share = (optimum.design![j]! - column.low) / (column.high - column.low);
        expect(Math.abs(share - 0.5)).toBeGreaterThan(0.1);
        expect(Math.abs(share - 0.5)).toBeLessThan(0.4);
      });
    }
  });

  test('moves the optimum with the seed', () => {
    const designs = seeds.map((seed) => make({}, seed).optimum.design!.join());
    expect(new Set(designs).size).toBe(seeds.length);
  });

  test('is a sum over columns with interaction 0, and is not with interaction', () => {
    const largestInteraction = (interaction: number, seed: number): number => {
      const task = make({ interaction }, seed);
      const stream = rootStream(seed);
      const [from, to] = [1, 2].map(() => Float64Array.from(sampleUniform(task.space, 1, stream).values));
      const gaps = task.space.columns.flatMap((_, j) =>
        task.space.columns.slice(0, j).map((_other, i) => {
          const first = from!.with(i, to![i]!);
          const second = from!.with(j, to![j]!);
          const both = first.with(j, to![j]!);
          const [none, one, two, together] = task.truth(matrixFromRows([from!, first, second, both]));
          return Math.abs(none! + together! - one! - two!);
        }),
      );
      return Math.max(...gaps);
    };
    for (const seed of seeds) {
      expect(largestInteraction(0, seed)).toBeLessThan(1e-9);
      expect(largestInteraction(0.5, seed)).toBeGreaterThan(1);
    }
  });

  test('wants another dial setting under another level, but only with interaction', () => {
    const bestLight = (task: Task, design: Float64Array): number => {
      const values = otherValues(task.space.columns[0]!, Number.NaN);
      const scores = scoresAlong(task, design, 0, values);
      return values[scores.indexOf(largest(scores))]!;
    };
    const asked = { continuous: 1, integers: 0, categories: 1, levels: 2, ruggedness: 0 };
    const moves = (interaction: number) =>
      seeds.filter((seed) => {
        const task = make({ ...asked, interaction }, seed);
        const { design } = task.optimum;
        return bestLight(task, design!) !== bestLight(task, design!.with(1, 1 - design![1]!));
      });
    expect(moves(0)).toEqual([]);
    expect(moves(1).length).toBeGreaterThan(15);
  });

  // What makes the family hard to learn from a random pool: the best level is demanding, the others forgive.
  test('hides the best level: with interaction its average yield need not be the highest', () => {
    const hidden = (interaction: number) =>
      seeds.filter((seed) => {
        const task = make({ categories: 1, interaction }, seed);
        const last = task.space.columns.length - 1;
        const designs = sampleUniform(task.space, 500, rootStream(seed));
        const rows = Array.from({ length: designs.rows }, (_, i) =>
          designs.values.slice(i * designs.columns, (i + 1) * designs.columns),
        );
        const means = [0, 1, 2, 3].map(
          (level) =>
            summarize(Array.from(task.truth(matrixFromRows(rows.map((row) => row.with(last, level)))))).mean,
        );
        return means.indexOf(Math.max(...means)) !== task.optimum.design![last];
      });
    expect(hidden(0)).toEqual([]);
    expect(hidden(1).length).toBeGreaterThan(10);
  });

  test('has one peak along a lone dial, and several with ruggedness', () => {
    const peaks = (ruggedness: number, seed: number): number => {
      const task = make({ continuous: 1, integers: 0, categories: 0, ruggedness }, seed);
      const { low, high } = task.space.columns[0] as { low: number; high: number };
      const values = Array.from({ length: 1001 }, (_, k) => low + ((high - low) * k) / 1000);
      const y = scoresAlong(task, Float64Array.of(low), 0, values);
      return y.filter((score, k) => k > 0 && k < 1000 && score > y[k - 1]! && score >= y[k + 1]!).length;
    };
    for (const seed of seeds) {
      expect(peaks(0, seed)).toBe(1);
      expect(peaks(1, seed)).toBeGreaterThan(1);
    }
  });

  test('falls more steeply on one side of the ideal than on the other', () => {
    for (const seed of seeds) {
      const task = make({ continuous: 1, integers: 0, categories: 0, ruggedness: 0 }, seed);
      const { low, high } = task.space.columns[0] as { low: number; high: number };
      const at = task.optimum.design![0]!;
      const [below, above] = scoresAlong(task, task.optimum.design!, 0, [
        at - 0.1 * (high - low),
        at + 0.1 * (high - low),
      ]);
      const losses = [100 - below!, 100 - above!].sort((a, b) => a - b);
      expect(losses[1]! / losses[0]!).toBeGreaterThan(1.2);
    }
  });

  test('keeps the optimum of an integer column a whole number', () => {
    for (const seed of seeds) {
      const { space, optimum } = make({ integers: 4 }, seed);
      const whole = space.columns.flatMap(({ kind }, j) => (kind === 'integer' ? [optimum.design![j]!] : []));
      expect(whole).toHaveLength(4);
      expect(whole.every(Number.isInteger)).toBe(true);
    }
  });
});
