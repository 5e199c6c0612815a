import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sortCells } from '../../results/scores.js';
import { makeRow } from './made-ledger.js';

const rows = ['naive', 'careful'].flatMap((method) =>
  ['nk', 'branin'].flatMap((task) => [2, 0, 1].map((seed) => makeRow({ task, method, seed }))),
);

describe('sortCells(rows, order)', () => {
  it('puts tasks and methods into the order of the plan, and seeds into ascending order', () => {
    const sections = sortCells(rows, { tasks: ['nk', 'branin'], methods: ['naive', 'careful'] });
    expect(sections.map(({ task }) => task)).toEqual(['nk', 'branin']);
    expect(sections[0]!.methods.map(({ method }) => method)).toEqual(['naive', 'careful']);
    expect(sections[0]!.methods[0]!.rows.map(({ seed }) => seed)).toEqual([0, 1, 2]);
    expect(sections[0]!.seeds).toEqual([0, 1, 2]);
  });

  it('orders by name what the plan does not name', () => {
    const sections = sortCells(rows, { tasks: ['nk'], methods: [] });
    expect(sections.map(({ task }) => task)).toEqual(['nk', 'branin']);
    expect(sections[1]!.methods.map(({ method }) => method)).toEqual(['careful', 'naive']);
  });

  it('keeps a task behind two curtains as two sections', () => {
    const other = makeRow({ method: 'naive', seed: 0, task: 'nk', curtain: 'thin=50', bestVisible: 0.3 });
    expect(sortCells([...rows, other]).map(({ task, curtain }) => [task, curtain])).toEqual([
      ['branin', 'ceiling=0.5'],
      ['nk', 'ceiling=0.5'],
      ['nk', 'thin=50'],
    ]);
  });

  it('tells one label with two settings apart by their hashes', () => {
    const sections = sortCells([
      makeRow({ method: 'naive', seed: 0, settings: 'aaaaaaaa' }),
      makeRow({ method: 'naive', seed: 0, settings: 'bbbbbbbb' }),
    ]);
    expect(sections[0]!.methods.map(({ method }) => method)).toEqual([
      'naive (settings aaaaaaaa)',
      'naive (settings bbbbbbbb)',
    ]);
  });

  it('gives the same sections for every order of the rows', () => {
    const expected = sortCells(rows);
    fc.assert(
      fc.property(fc.shuffledSubarray(rows, { minLength: rows.length }), (shuffled) => {
        expect(sortCells(shuffled)).toEqual(expected);
      }),
    );
  });

  it('takes best visible once a seed, however many methods there are', () => {
    const made = [0.5, 0.6].flatMap((bestVisible, seed) =>
      ['a', 'b', 'c'].map((method) => makeRow({ method, seed, bestVisible })),
    );
    expect(sortCells(made)[0]!.bestVisible).toEqual([0.5, 0.6]);
  });

  it('refuses a ledger without rows, a cell twice, a score that is no number, and methods on different pools', () => {
    const row = makeRow({ method: 'naive', seed: 0 });
    const refused = (made: Parameters<typeof sortCells>[0], message: RegExp): void => {
      expect(() => sortCells(made)).toThrow(expect.objectContaining({ code: 'bad-ledger' }));
      expect(() => sortCells(made)).toThrow(message);
    };
    refused([], /no finished cell/);
    refused([row, { ...row }], /"naive".* occurs twice/);
    refused([makeRow({ method: 'naive', seed: 0, median: Number.NaN })], /median NaN/);
    refused([makeRow({ method: 'naive', seed: 0, optimism: Number.POSITIVE_INFINITY })], /optimism Infinity/);
    refused(
      [row, makeRow({ method: 'other', seed: 0, bestVisible: 0.61 })],
      /same pool.*seed 0.*0\.6 and 0\.61/,
    );
  });
});
