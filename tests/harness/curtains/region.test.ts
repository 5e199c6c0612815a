import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { drawCurtain } from '../../../harness/curtain.js';
import type { DrawnRegionSpec, RegionSpec, WhereSpec } from '../../../harness/curtains/curtain-spec.js';
import { drawRegion, isInside } from '../../../harness/curtains/region.js';
import { matrixFromRows, rowView } from '../../../harness/designs.js';
import { OnebatchError } from '../../../harness/errors.js';
import { rootStream } from '../../../harness/random.js';
import { makeSpace, sampleUniform } from '../../../harness/space.js';
import { arbitrarySpace, runs } from '../arbitrary-space.js';
import { misfit, tally } from '../chi-square.js';
import { toyTask, withoutDesign } from '../toy-task.js';

const space = makeSpace([
  { kind: 'continuous', name: 'x', low: 0, high: 10 },
  { kind: 'integer', name: 'k', low: -3, high: 6 },
  { kind: 'category', name: 'c', levels: ['1', '2', 'three'] },
]);
const task = toyTask(space, rootStream(1));

const refusal = (message: RegExp) =>
  expect.objectContaining({ code: 'bad-settings', message: expect.stringMatching(message) });

const spec = (some: Partial<DrawnRegionSpec>): DrawnRegionSpec => ({
  columns: 2,
  share: 0.4,
  around: 'random',
  ...some,
});

describe('a written region', () => {
  test.each<[WhereSpec, (x: number, k: number, c: number) => boolean]>([
    [{ x: [2, 5] }, (x) => x >= 2 && x <= 5],
    [{ k: [-1, 2] }, (_, k) => k >= -1 && k <= 2],
    [{ k: [0, 0] }, (_, k) => k === 0],
    [{ c: ['three'] }, (_, __, c) => c === 2],
    [{ c: [1, 2] }, (_, __, c) => c !== 2],
    [{ x: [-5, 7], c: ['three', '1'] }, (x, _, c) => x <= 7 && c !== 1],
    [{ c: ['2', 'three'], k: [0, 6], x: [3, 30] }, (x, k, c) => x >= 3 && k >= 0 && c >= 1],
  ])('hides exactly the rows inside %j', (where, inside) => {
    for (let seed = 0; seed < 20; seed++) {
      const { pool, visible } = drawCurtain(task, { region: { where } }, 100, rootStream(seed));
      const expected = Array.from({ length: 100 }, (_, i) => i).filter((i) => {
        const [x, k, c] = rowView(pool.designs, i);
        return !inside(x!, k!, c!);
      });
      expect(visible).toEqual(expected);
      expect(visible.length).toBeLessThan(100);
    }
  });

  test('includes its bounds', () => {
    const region = drawRegion(task, { where: { x: [2, 5], k: [-1, 2] } }, rootStream(1));
    const rows = matrixFromRows([
      [2, -1, 0],
      [5, 2, 0],
      [5.000001, 2, 0],
      [5, 3, 0],
    ]);
    expect([0, 1, 2, 3].map((i) => isInside(region, rowView(rows, i)))).toEqual([true, true, false, false]);
  });

  test.each<[WhereSpec, RegExp]>([
    [{ y: [0, 1] }, /column "y", which the space doesn't have; it has x, k, c/],
    [{ c: ['three', 'four'] }, /level "four" of "c", whose levels are 1, 2, three/],
    [{ x: [1] }, /needs \[low, high\] for column "x", got \[1\]/],
    [{ x: [1, 2, 3] }, /needs \[low, high\] for column "x"/],
    [{ x: [5, 2] }, /needs \[low, high\] for column "x", got \[5,2\]/],
    [{ k: ['0', '1'] }, /needs \[low, high\] for column "k"/],
    [{ x: [11, 12] }, /11 to 12 on "x", which only goes from 0 to 10/],
    [{ k: [-9, -4] }, /-9 to -4 on "k", which only goes from -3 to 6/],
  ])('%j is refused', (where, message) => {
    expect(() => drawRegion(task, { where }, rootStream(1))).toThrow(OnebatchError);
    expect(() => drawRegion(task, { where }, rootStream(1))).toThrow(refusal(message));
  });

  test('names only the first columns of a long space', () => {
    const long = makeSpace(
      Array.from({ length: 50 }, (_, i) => ({ kind: 'continuous' as const, name: `x${i}`, low: 0, high: 1 })),
    );
    const where = { y: [0, 1] };
    expect(() => drawRegion(toyTask(long, rootStream(1)), { where }, rootStream(1))).toThrow(
      /it has x0, x1, x2, x3, x4, x5, … \(50 in all\)$/,
    );
  });
});

describe('a drawn region', () => {
  test('covers its share of different columns: of the range, of the whole numbers, of the levels', () => {
    fc.assert(
      fc.property(
        arbitrarySpace(),
        fc.nat(),
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        fc.constantFrom('random' as const, 'optimum' as const),
        (space, seed, share, around) => {
          const task = toyTask(space, rootStream(seed));
          const columns = 1 + (seed % space.columns.length);
          const region = drawRegion(task, { columns, share, around }, rootStream(seed));
          expect(new Set(region.map((side) => side.column)).size).toBe(columns);
          for (const side of region) {
            const column = space.columns[side.column]!;
            if ('levels' in side) {
              if (column.kind !== 'category') throw new Error('levels on a number column');
              const { length } = column.levels;
              expect(side.levels.size).toBe(Math.min(length - 1, Math.max(1, Math.round(share * length))));
              expect([...side.levels].every((level) => level >= 0 && level < length)).toBe(true);
              continue;
            }
            if (column.kind === 'category') throw new Error('an interval on a category');
            const tolerance = 1e-9 * Math.max(Math.abs(column.low), Math.abs(column.high));
            expect(side.low).toBeGreaterThanOrEqual(column.low);
            expect(side.high).toBeLessThanOrEqual(column.high + tolerance);
            const range = column.high - column.low;
            if (column.kind === 'continuous') {
              expect(Math.abs(side.high - side.low - share * range)).toBeLessThanOrEqual(tolerance);
            } else {
              expect(Number.isInteger(side.low) && Number.isInteger(side.high)).toBe(true);
              const expected = Math.min(range, Math.max(1, Math.round(share * (range + 1))));
              expect(side.high - side.low + 1).toBe(expected);
            }
          }
        },
      ),
      { ...runs, numRuns: 300 },
    );
  });

  test('around: optimum holds the optimum, in every space, and hides it', () => {
    fc.assert(
      fc.property(
        arbitrarySpace(),
        fc.nat(),
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        (space, seed, share) => {
          const task = toyTask(space, rootStream(seed));
          const columns = 1 + (seed % space.columns.length);
          const region = drawRegion(task, { columns, share, around: 'optimum' }, rootStream(seed));
          expect(isInside(region, task.optimum.design!)).toBe(true);
        },
      ),
      { ...runs, numRuns: 300 },
    );
  });

  test('around: random is not drawn to the optimum: on one column it holds a corner less often than its share', () => {
    const holds = (around: 'random' | 'optimum') =>
      tally(2, 300, () => {
        const stream = rootStream(1).split(around, holdsSeed++);
        return Number(isInside(drawRegion(task, spec({ columns: 1, around }), stream), task.optimum.design!));
      });
    let holdsSeed = 0;
    expect(holds('optimum')).toEqual([0, 300]);
    expect(holds('random')[0]).toBeGreaterThan(100);
  });

  test('lies anywhere with equal chance, and on every column equally often', () => {
    const sides = Array.from(
      { length: 9000 },
      (_, i) => drawRegion(task, spec({ columns: 1 }), rootStream(7).split(i))[0]!,
    );
    let next = 0;
    expect(misfit(tally(3, sides.length, () => sides[next++]!.column))).toBeLessThan(1);
    // x: 4 of 10 units, so low is uniform on [0, 6]; k: 4 of 10 values, so low is one of −3 … 3.
    const lows = (column: number) =>
      sides.flatMap((side) => (side.column === column && 'low' in side ? [side.low] : []));
    const [x, k] = [lows(0), lows(1)];
    next = 0;
    expect(misfit(tally(10, x.length, () => Math.floor((x[next++]! / 6) * 10)))).toBeLessThan(1);
    const counts = [-3, -2, -1, 0, 1, 2, 3].map((low) => k.filter((value) => value === low).length);
    expect(counts.reduce((a, b) => a + b)).toBe(k.length);
    // Each count is binomial(n, 1/7), false-alarm level 1e-6 or less.
    const n = k.length;
    for (const count of counts) expect(Math.abs(count - n / 7)).toBeLessThan(5 * Math.sqrt((n * 6) / 49));
  });

  test('hides the product of its shares of a uniform pool', () => {
    const rows = 20_000;
    const designs = sampleUniform(space, rows, rootStream(2));
    const region = drawRegion(task, spec({ columns: 3 }), rootStream(3));
    let inside = 0;
    for (let i = 0; i < rows; i++) if (isInside(region, rowView(designs, i))) inside += 1;
    // 0.4 of x, 4 of 10 values of k, round(0.4 · 3) = 1 of 3 levels.
    const share = 0.4 * 0.4 * (1 / 3);
    expect(Math.abs(inside - rows * share)).toBeLessThan(5 * Math.sqrt(rows * share * (1 - share)));
  });

  test('takes the same columns around the optimum as at random, and more columns contain fewer', () => {
    const columns = (some: Partial<DrawnRegionSpec>) =>
      drawRegion(task, spec(some), rootStream(9)).map((side) => side.column);
    expect(columns({ around: 'optimum' })).toEqual(columns({}));
    expect(columns({ columns: 3 }).slice(0, 2)).toEqual(columns({}));
  });

  test.each<[RegionSpec, RegExp]>([
    [spec({ columns: 4 }), /asks for 4 columns but the space has 3/],
    [spec({ around: 'optimum' }), /around the optimum, but this task's best design is not known/],
  ])('%j is refused where the task has no place for it', (region, message) => {
    expect(() => drawRegion(withoutDesign(task), region, rootStream(1))).toThrow(refusal(message));
  });

  test('can lie at random where the best design is not known', () => {
    expect(drawRegion(withoutDesign(task), spec({}), rootStream(1))).toHaveLength(2);
  });
});
