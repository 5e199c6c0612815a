import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { chooseVariant } from '../../../results/sweep/choose-variant.js';
import { makeRow } from '../made-ledger.js';

/** Rows of one variant on one task, one seed a score, from seed 1 on. */
const run = (method: string, bests: readonly number[], parts: { task?: string; curtain?: string } = {}) =>
  bests.map((best, i) => makeRow({ method, seed: i + 1, best, ...parts }));

describe('chooseVariant(rows, variants, score)', () => {
  test('takes the mean of task means, not of cells: (0.2 + 0.8) / 2 against (0.4 + 0.5) / 2', () => {
    const rows = [
      ...run('a', [0.2, 0.2, 0.2, 0.2], { task: 's' }),
      ...run('a', [0.8], { task: 't' }),
      ...run('b', [0.4, 0.4, 0.4, 0.4], { task: 's' }),
      ...run('b', [0.5], { task: 't' }),
    ];
    const chosen = chooseVariant(rows, ['b', 'a'], 'best')!;
    expect(chosen).toMatchObject({ variant: 'a', tasks: 2, cells: 5, leftOut: 0 });
    expect(chosen.score).toBeCloseTo(0.5, 12);
  });

  test('counts each curtain of a task as a task', () => {
    const rows = [
      ...run('a', [1, 1, 1], { curtain: 'open' }),
      ...run('a', [0], { curtain: 'thin=5' }),
      ...run('b', [0.6, 0.6, 0.6], { curtain: 'open' }),
      ...run('b', [0.6], { curtain: 'thin=5' }),
    ];
    expect(chooseVariant(rows, ['a', 'b'], 'best')).toMatchObject({ variant: 'b', tasks: 2 });
  });

  test('chooses by the score asked for', () => {
    const rows = [
      makeRow({ method: 'a', seed: 1, best: 0.9, median: 0.1 }),
      makeRow({ method: 'b', seed: 1, best: 0.5, median: 0.4 }),
    ];
    expect(chooseVariant(rows, ['a', 'b'], 'best')).toMatchObject({ variant: 'a', score: 0.9 });
    expect(chooseVariant(rows, ['a', 'b'], 'median')).toMatchObject({ variant: 'b', score: 0.4 });
    expect(chooseVariant(rows, ['a', 'b'], 'lift')!.variant).toBe('a');
  });

  test('counts a failed cell with its score', () => {
    const rows = [
      ...run('a', [0.7, 0.7]),
      ...run('b', [0.9]),
      makeRow({ method: 'b', seed: 2, best: 0.1, status: 'failed', reason: 'out of time', distinct: 0 }),
    ];
    expect(chooseVariant(rows, ['a', 'b'], 'best')!.variant).toBe('a');
  });

  test('leaves out cells that a variant lacks, and says how many', () => {
    const rows = [...run('a', [0.5, 0.5, 0.9]), ...run('b', [0.6, 0.4])];
    const chosen = chooseVariant(rows, ['a', 'b'], 'best');
    expect(chosen).toMatchObject({ variant: 'a', cells: 2, leftOut: 1 });
    expect(chosen!.score).toBeCloseTo(0.5, 12);
  });

  test('finds nothing to choose on where a variant has no cell with the others', () => {
    expect(chooseVariant(run('a', [0.5]), ['a', 'b'], 'best')).toBeUndefined();
    expect(chooseVariant([], ['a', 'b'], 'best')).toBeUndefined();
  });

  test('takes the first of equals, and does not look at the order of rows', () => {
    const score = fc.integer({ min: 0, max: 3 });
    const table = fc.array(fc.tuple(score, score, score), { minLength: 1, maxLength: 6 });
    fc.assert(
      fc.property(table, fc.infiniteStream(fc.nat()), (bests, ranks) => {
        const rows = ['a', 'b', 'c'].flatMap((method, k) =>
          run(
            method,
            bests.map((row) => row[k]!),
          ),
        );
        const mixed = rows.map((row) => ({ row, rank: ranks.next().value! }));
        mixed.sort((x, y) => x.rank - y.rank);
        const chosen = chooseVariant(rows, ['c', 'a', 'b'], 'best')!;
        expect(
          chooseVariant(
            mixed.map(({ row }) => row),
            ['c', 'a', 'b'],
            'best',
          ),
        ).toEqual(chosen);
        const sums = [2, 0, 1].map((k) => bests.reduce((sum, row) => sum + row[k]!, 0));
        expect(chosen.variant).toBe(['c', 'a', 'b'][sums.indexOf(Math.max(...sums))]);
      }),
    );
  });
});
