import { describe, expect, test } from 'vitest';
import {
  copyMatrix,
  type Designs,
  matrixFromRows,
  rowView,
  stackRows,
  takeRows,
  zeros,
} from '../../harness/designs.js';
import { rootStream, type Stream, shuffleInPlace } from '../../harness/random.js';
import {
  type Column,
  findBreach,
  makeSpace,
  type Space,
  sampleColumn,
  sampleUniform,
} from '../../harness/space.js';
import type { Task, TaskFamily } from '../../harness/task.js';

/** How hard the contract looks; the defaults suit a family whose truth costs little. */
export interface ContractEffort {
  /** Instances made per settings, from seeds 1, 2, …; default 5. */
  readonly instances?: number;
  /** Designs drawn per instance, uniformly and again around the optimum; default 200. */
  readonly rows?: number;
}

/** Share of a score's size (at least 1) by which two roads to the same score may differ. */
const tolerance = 1e-9;

/**
 * What every task family promises, as a suite: the same stream gives the same instance, scores are finite and belong
 * to the row alone, the argument is left as it was, and the optimum is inside the space, reaches its value, and is
 * not beaten unless it is only `best-known`.
 *
 * `settingsList` holds settings as a plan would write them; each is parsed by the family's own schema.
 */
export function describeTaskContract(
  name: string,
  family: TaskFamily,
  settingsList: readonly Record<string, unknown>[],
  { instances = 5, rows = 200 }: ContractEffort = {},
): void {
  const make = (settings: Record<string, unknown>, seed: number) =>
    family.make(family.settings.parse(settings), rootStream(seed).split('task', name));
  const seeds = Array.from({ length: instances }, (_, i) => i + 1);

  describe(`${name} keeps the task contract`, () => {
    test('is named by lower-case words joined by hyphens, with one line of description and a source', () => {
      expect(family.name).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
      expect(family.description).toMatch(/^\S.*\S$/);
      expect(family.source).toMatch(/^\S.*\S$/);
    });

    test('parses {} to its defaults, describes every setting and refuses an unknown one', () => {
      expect(family.settings.safeParse({}).success).toBe(true);
      for (const [key, schema] of Object.entries(family.settings.shape)) {
        expect((schema as { description?: string }).description, key).toMatch(/\S/);
      }
      expect(family.settings.safeParse({ 'no such setting': 1 }).success).toBe(false);
    });

    describe.each(settingsList.map((settings) => [JSON.stringify(settings), settings] as const))(
      'with %s',
      (_, settings) => {
        test.each(seeds)(
          'make(settings, stream) gives the same instance for the same stream, seed %i',
          (seed) => {
            const [task, again] = [make(settings, seed), make(settings, seed)];
            const designs = sampleUniform(task.space, rows, rootStream(seed));
            expect(again.space).toEqual(task.space);
            expect(again.optimum).toEqual(task.optimum);
            expect(again.truth(designs)).toEqual(task.truth(designs));
          },
        );

        test.each(seeds)('truth(designs) is finite and leaves designs as they were, seed %i', (seed) => {
          const task = make(settings, seed);
          expect(() => makeSpace(task.space.columns)).not.toThrow();
          const designs = sampleUniform(task.space, rows, rootStream(seed));
          const before = copyMatrix(designs);
          const scores = task.truth(designs);
          expect(designs).toEqual(before);
          expect(scores).toBeInstanceOf(Float64Array);
          expect(scores).toHaveLength(rows);
          expect(scores.every(Number.isFinite)).toBe(true);
          expect(task.truth(designs)).toEqual(scores);
          expect(task.truth(zeros(0, task.space.columns.length))).toHaveLength(0);
        });

        test.each(seeds)('truth(designs) scores a row alike wherever it stands, seed %i', (seed) => {
          const task = make(settings, seed);
          const stream = rootStream(seed);
          const designs = sampleUniform(task.space, rows, stream);
          const scores = task.truth(designs);
          const order = shuffleInPlace(
            Array.from({ length: rows }, (_, i) => i),
            stream,
          );
          const shuffled = task.truth(takeRows(designs, order));
          expect(Array.from(shuffled)).toEqual(order.map((i) => scores[i]!));
          expect(task.truth(takeRows(designs, [order[0]!]))[0]).toBe(shuffled[0]);
        });

        test.each(seeds)(
          'optimum.design lies inside the space and reaches optimum.value, seed %i',
          (seed) => {
            const { space, truth, optimum } = make(settings, seed);
            expect(Number.isFinite(optimum.value)).toBe(true);
            if (optimum.design === undefined) return;
            const design = matrixFromRows([optimum.design]);
            expect(findBreach(space, design)).toBeUndefined();
            const gap = Math.abs(truth(design)[0]! - optimum.value);
            expect(gap).toBeLessThanOrEqual(tolerance * sizeOf(optimum.value));
          },
        );

        test.each(seeds)('no design drawn at large or near the optimum beats it, seed %i', (seed) => {
          const task = make(settings, seed);
          if (task.optimum.known === 'best-known') return;
          const scores = task.truth(sampleRivals(task, rows, rootStream(seed)));
          const best = scores.reduce((a, b) => Math.max(a, b));
          expect(best).toBeLessThanOrEqual(task.optimum.value + tolerance * sizeOf(task.optimum.value));
        });
      },
    );
  });
}

function sizeOf(value: number): number {
  return Math.max(1, Math.abs(value));
}

/** Designs that might beat the optimum: uniform ones and, where its design is known, small changes of it. */
function sampleRivals({ space, optimum }: Task, rows: number, stream: Stream): Designs {
  const uniform = sampleUniform(space, rows, stream);
  return optimum.design === undefined
    ? uniform
    : stackRows([uniform, sampleNear(space, optimum.design, rows, stream)]);
}

/**
 * Designs near one: every other row changes a single column, the rest change several, by steps from a millionth to a
 * tenth of a continuous column's range; an integer or category column is drawn anew.
 */
function sampleNear(space: Space, centre: Float64Array, rows: number, stream: Stream): Designs {
  const near = zeros(rows, space.columns.length);
  for (let i = 0; i < rows; i++) {
    const row = rowView(near, i);
    row.set(centre);
    const changes = i % 2 === 0 ? 1 : 1 + stream.below(space.columns.length);
    const share = 10 ** (-1 - 5 * stream.uniform());
    for (let k = 0; k < changes; k++) {
      const j = stream.below(space.columns.length);
      row[j] = changeColumn(space.columns[j]!, row[j]!, share, stream);
    }
  }
  return near;
}

function changeColumn(column: Column, value: number, share: number, stream: Stream): number {
  if (column.kind !== 'continuous') return sampleColumn(column, stream);
  const moved = value + (2 * stream.uniform() - 1) * share * (column.high - column.low);
  return Math.min(column.high, Math.max(column.low, moved));
}
