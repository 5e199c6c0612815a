import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { rootStream } from '../../harness/random.js';
import { type Column, sampleUniform } from '../../harness/space.js';
import type { Task, TaskFamily } from '../../harness/task.js';
import { ackley } from '../../tasks/ackley.js';
import { branin } from '../../tasks/branin.js';
import { hartmann3, hartmann6 } from '../../tasks/hartmann.js';
import { levy } from '../../tasks/levy.js';
import { rastrigin } from '../../tasks/rastrigin.js';
import { rosenbrock } from '../../tasks/rosenbrock.js';
import { styblinskiTang } from '../../tasks/styblinski-tang.js';
import { describeTaskContract } from './contract.js';
import { gap, type PublishedFunction, publishedFunction, scoreOf } from './published.js';

const anySize = [
  rosenbrock,
  ackley,
  rastrigin,
  levy,
  styblinskiTang,
] as const satisfies readonly TaskFamily[];
const fixedSize = [branin, hartmann3, hartmann6] as const satisfies readonly TaskFamily[];
const families: readonly TaskFamily[] = [...anySize, ...fixedSize];
const named = (list: readonly TaskFamily[]) => list.map((family) => [family.name, family] as const);

function make(family: TaskFamily, settings: Record<string, unknown>, seed = 1): Task {
  return family.make(family.settings.parse(settings), rootStream(seed));
}

/** The function as published, in as many dimensions as the point has. */
function still(family: TaskFamily, dimensions: number): Task {
  const hasSize = 'dimensions' in family.settings.shape;
  return make(family, hasSize ? { dimensions, moved: false } : { moved: false });
}

function rangeOf(column: Column): readonly [low: number, high: number] {
  if (column.kind !== 'continuous') throw new Error(`column ${column.name} is not continuous`);
  return [column.low, column.high];
}

function shareOf(value: number, [low, high]: readonly [number, number]): number {
  return (value - low) / (high - low);
}

function stepped(from: ArrayLike<number>, j: number, step: number): Float64Array {
  return Float64Array.from(from, (value, k) => (k === j ? value + step : value));
}

for (const family of anySize) {
  describeTaskContract(family.name, family, [{}, { dimensions: 2 }, { dimensions: 40 }, { moved: false }]);
}
for (const family of fixedSize) describeTaskContract(family.name, family, [{}, { moved: false }]);

describe('functions as published, tests/reference/test-functions.json', () => {
  interface Entry extends PublishedFunction {
    readonly bounds: readonly [number, number][] | { readonly every_coordinate: [number, number] };
  }

  test.each(named(families))('%s with moved: false has the published value at 5 points', (name, family) => {
    const { check_points } = publishedFunction<Entry>(name);
    expect(check_points).toHaveLength(5);
    for (const { x, f } of check_points) {
      expect(gap(scoreOf(still(family, x.length), x), -f), x.join()).toBeLessThan(1e-10);
    }
  });

  test.each(named(families))('%s lives in the published box, moved or not', (name, family) => {
    const { bounds, check_points } = publishedFunction<Entry>(name);
    const d = check_points[4]!.x.length;
    const expected =
      'every_coordinate' in bounds ? Array.from({ length: d }, () => bounds.every_coordinate) : bounds;
    const ranges = (task: Task) => task.space.columns.map(rangeOf);
    expect(ranges(still(family, d))).toEqual(expected);
    const moved = make(family, 'dimensions' in family.settings.shape ? { dimensions: d } : {});
    expect(ranges(moved).sort()).toEqual([...expected].sort());
    expect(moved.space.columns.map(({ name }) => name)).toEqual(expected.map((_, j) => `x${j + 1}`));
  });

  test.each(named([rosenbrock, ackley, rastrigin, levy]))('%s has its optimum 0 exactly', (name, family) => {
    const { optimum } = publishedFunction<Entry & { optimum: { min: number; minimizers: string } }>(name);
    const coordinate = optimum.minimizers.includes('1') ? 1 : 0;
    const task = still(family, 10);
    expect(task.optimum).toEqual({
      value: optimum.min,
      design: new Float64Array(10).fill(coordinate),
      known: 'published',
    });
    expect(scoreOf(task, task.optimum.design!)).toBe(0);
  });

  test.each(named(fixedSize))('%s has the published optimum at each published minimiser', (name, family) => {
    interface WithMinimizers extends Entry {
      optimum: { min: number; minimizers: number[][] };
    }
    const { optimum } = publishedFunction<WithMinimizers>(name);
    const task = still(family, optimum.minimizers[0]!.length);
    expect(gap(task.optimum.value, -optimum.min)).toBeLessThan(1e-15);
    for (const x of optimum.minimizers) expect(gap(scoreOf(task, x), -optimum.min)).toBeLessThan(1e-14);
    const distances = optimum.minimizers.map((x) =>
      Math.hypot(...x.map((value, j) => value - task.optimum.design![j]!)),
    );
    expect(Math.min(...distances)).toBeLessThan(1e-14);
  });

  test('styblinski-tang has −39.16616570377141 a dimension at the root of 4x³ − 32x + 5', () => {
    interface WithRoot extends Entry {
      optimum: { min_per_dimension: number; minimizer_coordinate: number };
    }
    const { optimum } = publishedFunction<WithRoot>('styblinski-tang');
    const task = still(styblinskiTang, 7);
    expect(gap(task.optimum.value, -7 * optimum.min_per_dimension)).toBeLessThan(1e-14);
    for (const x of task.optimum.design!) expect(gap(x, optimum.minimizer_coordinate)).toBeLessThan(1e-14);
  });

  test('branin carries each of its three optima in some instance', () => {
    const { optimum } = publishedFunction<Entry & { optimum: { minimizers: number[][] } }>('branin');
    const published = still(branin, 2);
    const carried = Array.from({ length: 30 }, (_, s) => {
      const task = make(branin, {}, s + 1);
      const first = task.space.columns.findIndex(
        (column) => column.kind === 'continuous' && column.low === -5,
      );
      const score = scoreOf(task, stepped(task.optimum.design!, first, 0.5));
      return optimum.minimizers.flatMap((x, m) =>
        [0.5, -0.5].some((step) => gap(scoreOf(published, stepped(x, 0, step)), score) < 1e-10) ? [m] : [],
      );
    });
    expect(carried.every((matches) => matches.length === 1)).toBe(true);
    expect(new Set(carried.flat())).toEqual(new Set([0, 1, 2]));
  });
});

describe('moved instances', () => {
  test.each(named(families))('%s differs from seed to seed', (_, family) => {
    const optima = Array.from({ length: 20 }, (_, s) => make(family, {}, s + 1).optimum.design!.join());
    expect(new Set(optima).size).toBe(20);
  });

  test.each(named(families))(
    '%s moves its optimum at most 20 % of a range and keeps it 5 % from the edge, or as far as it was',
    (name, family) => {
      const bounds = still(family, 10).space.columns.map(rangeOf);
      const minimisers =
        name === 'branin'
          ? publishedFunction<PublishedFunction & { optimum: { minimizers: number[][] } }>(name).optimum
              .minimizers
          : [Array.from(still(family, 10).optimum.design!)];
      const starts = minimisers.flatMap((x) => x.map((value, i) => shareOf(value, bounds[i]!)));
      const nearest = Math.min(0.05, ...starts, ...starts.map((start) => 1 - start));
      const reachable = [...starts, ...starts.map((start) => 1 - start)];
      for (let seed = 1; seed <= 30; seed++) {
        const { space, optimum } = make(family, {}, seed);
        space.columns.forEach((column, j) => {
          const share = shareOf(optimum.design![j]!, rangeOf(column));
          expect(Math.min(share, 1 - share)).toBeGreaterThanOrEqual(nearest - 1e-12);
          const shift = Math.min(...reachable.map((start) => Math.abs(start - share)));
          expect(shift).toBeLessThanOrEqual(0.2 + 1e-12);
        });
      }
    },
  );

  test.each(named([hartmann3, hartmann6]))(
    '%s is the published function seen through swapped, reflected and shifted axes',
    (_, family) => {
      const published = still(family, 0);
      const best = published.optimum.design!;
      const d = best.length;
      const step = 0.1;
      const orders = new Set<string>();
      const signs: number[] = [];
      const shifts: number[] = [];
      for (let seed = 1; seed <= 20; seed++) {
        const task = make(family, {}, seed);
        // A step along one column finds the published axis and direction it stands for.
        const axes = Array.from({ length: d }, (_, j) => {
          const score = scoreOf(task, stepped(task.optimum.design!, j, step));
          const fits = Array.from({ length: d }, (_, i) => [1, -1].map((sign) => ({ i, sign }))).flat();
          return fits.filter(
            ({ i, sign }) => gap(scoreOf(published, stepped(best, i, sign * step)), score) < 1e-12,
          );
        });
        expect(axes.map((fits) => fits.length)).toEqual(new Array(d).fill(1));
        expect(new Set(axes.map(([fit]) => fit!.i)).size).toBe(d);
        orders.add(axes.map(([fit]) => fit!.i).join());
        axes.forEach(([fit], j) => {
          const { i, sign } = fit!;
          signs.push(sign);
          shifts.push(task.optimum.design![j]! - (sign === 1 ? best[i]! : 1 - best[i]!));
        });
        const designs = sampleUniform(task.space, 10, rootStream(seed));
        task.truth(designs).forEach((score, row) => {
          const x = new Float64Array(d);
          axes.forEach(([fit], j) => {
            const { i, sign } = fit!;
            x[i] = best[i]! + sign * (designs.values[row * d + j]! - task.optimum.design![j]!);
          });
          expect(gap(score, scoreOf(published, x))).toBeLessThan(1e-12);
        });
      }
      expect(orders.size).toBeGreaterThan(3);
      // At least 60 fair coins: a share outside 25 % to 75 % has a probability below 0.001.
      const reflected = signs.filter((sign) => sign === -1).length / signs.length;
      expect(Math.abs(reflected - 0.5)).toBeLessThan(0.25);
      expect(Math.min(...shifts)).toBeLessThan(-0.15);
      expect(Math.max(...shifts)).toBeGreaterThan(0.15);
      expect(Math.max(...shifts.map(Math.abs))).toBeLessThanOrEqual(0.2 + 1e-12);
    },
  );

  test.each(named([ackley, rastrigin]))(
    '%s, even and alike in all axes, scores a design by its distance from the optimum alone',
    (_, family) => {
      const published = still(family, 6);
      fc.assert(
        fc.property(
          fc.integer({ min: 1, max: 1000 }),
          fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 6, maxLength: 6 }),
          (seed, away) => {
            const task = make(family, { dimensions: 6 }, seed);
            const design = task.optimum.design!.map((value, j) => value + away[j]!);
            expect(gap(scoreOf(task, design), scoreOf(published, away))).toBeLessThan(1e-9);
          },
        ),
        { numRuns: 60 },
      );
    },
  );

  test.each(named(fixedSize))('%s is not beaten by a climb from many starts in a moved box', (_, family) => {
    // A pattern search: steps of one column at a time, halved when none helps.
    for (let seed = 1; seed <= 5; seed++) {
      const task = make(family, {}, seed);
      const starts = sampleUniform(task.space, 10, rootStream(seed));
      for (let row = 0; row < starts.rows; row++) {
        const d = starts.columns;
        const at = starts.values.slice(row * d, (row + 1) * d);
        let score = scoreOf(task, at);
        for (let share = 0.1; share > 1e-5; ) {
          let helped = false;
          for (let j = 0; j < 2 * d; j++) {
            const [low, high] = rangeOf(task.space.columns[j >> 1]!);
            const step = (j % 2 === 0 ? share : -share) * (high - low);
            const next = at.slice();
            next[j >> 1] = Math.min(high, Math.max(low, at[j >> 1]! + step));
            const reached = scoreOf(task, next);
            if (reached > score) {
              at.set(next);
              score = reached;
              helped = true;
            }
          }
          if (!helped) share /= 2;
        }
        expect(score).toBeLessThanOrEqual(task.optimum.value + 1e-9);
      }
    }
  });
});

describe('large instances', () => {
  test.each(named(anySize))(
    '%s scores designs of 5,000 columns and carries its optimum along',
    (_, family) => {
      const task = make(family, { dimensions: 5000 });
      expect(task.space.columns).toHaveLength(5000);
      const { value, design } = task.optimum;
      expect(Math.abs(scoreOf(task, design!) - value)).toBeLessThanOrEqual(
        1e-9 * Math.max(1, Math.abs(value)),
      );
      const scores = task.truth(sampleUniform(task.space, 20, rootStream(1)));
      expect(scores.every((score) => Number.isFinite(score) && score < value)).toBe(true);
    },
  );

  test.each(named(anySize))('%s refuses more than 5,000 columns and fewer than it needs', (name, family) => {
    expect(family.settings.safeParse({ dimensions: 5001 }).success).toBe(false);
    expect(family.settings.safeParse({ dimensions: name === 'rosenbrock' ? 1 : 0 }).success).toBe(false);
    expect(family.settings.safeParse({ dimensions: name === 'rosenbrock' ? 2 : 1 }).success).toBe(true);
    expect(family.settings.parse({})).toEqual({ dimensions: 10, moved: true });
  });
});
