import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { FamilySpec } from '../../harness/curtains/curtain-spec.js';
import { rowView } from '../../harness/designs.js';
import { OnebatchError } from '../../harness/errors.js';
import { drawPool } from '../../harness/pool.js';
import { rootStream } from '../../harness/random.js';
import { countValues, findBreach, makeSpace, sequenceSpace } from '../../harness/space.js';
import type { Task } from '../../harness/task.js';
import { arbitrarySpace, runs } from './arbitrary-space.js';
import { misfit, tally } from './chi-square.js';
import { toyTask } from './toy-task.js';

const line = makeSpace([{ kind: 'continuous', name: 'x', low: 0, high: 1 }]);
const identity: Task = {
  space: line,
  truth: (designs) => designs.values.slice(),
  optimum: { value: 1, design: Float64Array.of(1), known: 'exact' },
};

const zeroCounts = (cells: number) => new Array<number>(cells).fill(0);

const arbitraryTask = fc
  .record({ space: arbitrarySpace(), seed: fc.nat() })
  .map(({ space, seed }) => ({ task: toyTask(space, rootStream(seed)), seed }));

describe('drawPool(task, rows, stream)', () => {
  test('draws rows inside the space with their true scores, floor and deviation', () => {
    fc.assert(
      fc.property(arbitraryTask, fc.integer({ min: 2, max: 60 }), ({ task, seed }, rows) => {
        const pool = drawPool(task, rows, rootStream(seed));
        expect(pool.designs.rows).toBe(rows);
        expect(findBreach(task.space, pool.designs)).toBeUndefined();
        expect(pool.scores).toEqual(task.truth(pool.designs));
        expect(pool.floor).toBe(Math.min(...pool.scores));
        // Σᵢⱼ (yᵢ − yⱼ)² = 2n(n − 1) · variance: the deviation without a mean.
        const [y, n] = [Array.from(pool.scores), rows];
        const pairs = y.reduce((sum, a) => sum + y.reduce((part, b) => part + (a - b) ** 2, 0), 0);
        expect(pool.deviation).toBeCloseTo(Math.sqrt(pairs / (2 * n * (n - 1))), 10);
        expect(pool.parents).toEqual([]);
      }),
      runs,
    );
  });

  test('is uniform: scores of y = x have the floor, deviation and bins of a uniform sample', () => {
    const rows = 50_000;
    const pool = drawPool(identity, rows, rootStream(1));
    const counts = zeroCounts(100);
    for (const score of pool.scores) counts[Math.floor(score * 100)]! += 1;
    expect(misfit(counts)).toBeLessThan(1);
    // Chance of a floor above 20/rows: e⁻²⁰. Deviation of a uniform: 1/√12, with kurtosis 1.8 and so a relative
    // standard error of √(0.8/4n).
    expect(pool.floor).toBeLessThan(20 / rows);
    expect(Math.abs(pool.deviation * Math.sqrt(12) - 1)).toBeLessThan(5 * Math.sqrt(0.2 / rows));
  });

  test('gives the same pool for the same stream, however far it was drawn, and a larger pool begins with a smaller', () => {
    const used = rootStream(2);
    used.uniform();
    const pool = drawPool(identity, 40, used);
    expect(drawPool(identity, 40, rootStream(2))).toEqual(pool);
    expect(drawPool(identity, 10, rootStream(2)).scores).toEqual(pool.scores.slice(0, 10));
    expect(drawPool(identity, 40, rootStream(3)).scores).not.toEqual(pool.scores);
  });

  test.each([1, 0, -5, 2.5, Number.NaN])('refuses %d rows', (rows) => {
    expect(() => drawPool(identity, rows, rootStream(1))).toThrow(
      new OnebatchError('bad-settings', `a pool needs a whole number of at least 2 rows, got ${rows}`),
    );
  });

  test('refuses a true score that is not a finite number, naming the row', () => {
    const broken: Task = {
      ...identity,
      truth: (designs) => designs.values.map((_, i) => (i === 3 ? Number.NaN : 1)),
    };
    expect(() => drawPool(broken, 10, rootStream(1))).toThrow(/pool row 3 as NaN/);
  });
});

describe('drawPool(task, rows, stream, family)', () => {
  const family: fc.Arbitrary<FamilySpec> = fc.record({
    parents: fc.integer({ min: 1, max: 5 }),
    changes: fc.integer({ min: 1, max: 4 }),
  });

  test('replaces the later half by variants 1 … changes columns away from a parent, and scores the final pool', () => {
    fc.assert(
      fc.property(arbitraryTask, family, fc.integer({ min: 9, max: 40 }), ({ task, seed }, family, rows) => {
        const plain = drawPool(task, rows, rootStream(seed));
        const pool = drawPool(task, rows, rootStream(seed), family);
        const founders = Math.ceil(rows / 2);
        const d = task.space.columns.length;
        expect(pool.designs.values.slice(0, founders * d)).toEqual(
          plain.designs.values.slice(0, founders * d),
        );
        expect(new Set(pool.parents).size).toBe(family.parents);
        expect(pool.parents.every((parent) => parent >= 0 && parent < founders)).toBe(true);
        for (let i = founders; i < rows; i++) {
          const changed = pool.parents.map((parent) => {
            const other = rowView(pool.designs, parent);
            return rowView(pool.designs, i).filter((value, j) => value !== other[j]).length;
          });
          expect(changed.some((count) => count >= 1 && count <= family.changes)).toBe(true);
        }
        expect(findBreach(task.space, pool.designs)).toBeUndefined();
        expect(pool.scores).toEqual(task.truth(pool.designs));
        expect(pool.floor).toBe(Math.min(...pool.scores));
      }),
      runs,
    );
  });

  test('draws number of changes, columns and other levels evenly', () => {
    const task = toyTask(sequenceSpace(6, ['A', 'C', 'G', 'T']), rootStream(1));
    const pool = drawPool(task, 40_000, rootStream(4), { parents: 1, changes: 3 });
    const parent = rowView(pool.designs, pool.parents[0]!);
    const [amounts, columns, others] = [zeroCounts(3), zeroCounts(6), zeroCounts(3)];
    for (let i = 20_000; i < 40_000; i++) {
      const row = rowView(pool.designs, i);
      const changed = [0, 1, 2, 3, 4, 5].filter((j) => row[j] !== parent[j]);
      const one = changed[i % changed.length]!;
      amounts[changed.length - 1]! += 1;
      columns[one]! += 1;
      others[(row[one]! - parent[one]! + 4 - 1) % 4]! += 1;
    }
    for (const counts of [amounts, columns, others]) expect(misfit(counts)).toBeLessThan(1);
  });

  test('makes as many variants of each parent', () => {
    const task = toyTask(sequenceSpace(12, ['A', 'C', 'G', 'T']), rootStream(1));
    const pool = drawPool(task, 20_000, rootStream(4), { parents: 3, changes: 1 });
    const distance = (a: number, b: number) =>
      rowView(pool.designs, a).filter((value, j) => value !== rowView(pool.designs, b)[j]).length;
    const [a, b, c] = pool.parents as [number, number, number];
    expect(Math.min(distance(a, b), distance(a, c), distance(b, c))).toBeGreaterThan(2);
    let i = 10_000;
    const parentOf = () => {
      const row = i++;
      return pool.parents.findIndex((parent) => distance(row, parent) === 1);
    };
    expect(misfit(tally(3, 10_000, parentOf))).toBeLessThan(1);
  });

  test('never repeats the parent, even where a column has only two values', () => {
    const space = makeSpace([
      { kind: 'integer', name: 'k', low: -1, high: 0 },
      { kind: 'category', name: 'c', levels: ['a', 'b'] },
    ]);
    expect(space.columns.map(countValues)).toEqual([2, 2]);
    const pool = drawPool(toyTask(space, rootStream(1)), 400, rootStream(5), { parents: 1, changes: 1 });
    const parent = rowView(pool.designs, pool.parents[0]!);
    const changes = Array.from({ length: 200 }, (_, i) => {
      const row = rowView(pool.designs, 200 + i);
      return row.filter((value, j) => value !== parent[j]).length;
    });
    expect(new Set(changes)).toEqual(new Set([1]));
  });

  test('refuses more parents than the first half has rows', () => {
    expect(() => drawPool(identity, 9, rootStream(1), { parents: 6, changes: 1 })).toThrow(
      /6 parents but half of the pool has only 5 rows/,
    );
    expect(drawPool(identity, 9, rootStream(1), { parents: 5, changes: 1 }).parents).toHaveLength(5);
  });
});
