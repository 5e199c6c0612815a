import { expect, test } from 'vitest';
import { cellId } from '../../harness/row.js';
import { mergeLedgers } from '../../results/merge-ledgers.js';
import { makeRow } from './made-ledger.js';

const row = makeRow({ method: 'a', seed: 1 });
const other = makeRow({ method: 'b', seed: 1 });

test('a cell of two ledgers is kept once, with the seconds of the first', () => {
  const { rows, seconds } = mergeLedgers([
    { place: 'one', rows: [row], seconds: new Map([[cellId(row), 1]]) },
    { place: 'two', rows: [{ ...row }, other], seconds: new Map([[cellId(row), 2]]) },
  ]);
  expect(rows).toEqual([row, other]);
  expect(seconds.get(cellId(row))).toBe(1);
});

test('the same method with other settings is another cell', () => {
  const tuned = { ...row, settings: '11111111', best: 0.9 };
  const ledgers = [row, tuned].map((it, i) => ({
    place: `${i}`,
    rows: [it],
    seconds: new Map<string, number>(),
  }));
  expect(mergeLedgers(ledgers).rows).toHaveLength(2);
});

test('a cell with other numbers is refused, naming both ledgers, the cell and what differs', () => {
  const ledgers = [row, { ...row, best: 0.9 }].map((it, i) => ({
    place: `run-${i}`,
    rows: [it],
    seconds: new Map<string, number>(),
  }));
  expect(() => mergeLedgers(ledgers)).toThrow(
    'run-0 and run-1 disagree on a, hartmann-6 behind ceiling=0.5, seed 1: best 0.7 and 0.9; compare ledgers of one plan, or one of the two alone',
  );
});
