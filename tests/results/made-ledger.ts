import { type CellRow, cellId } from '../../harness/row.js';

/** What a made row differs in from a plain one. */
export type RowParts = Partial<CellRow> & Pick<CellRow, 'method' | 'seed'>;

/** One row of a made ledger; lift follows from best and best visible unless given. */
export function makeRow(parts: RowParts): CellRow {
  const row = {
    task: 'hartmann-6',
    curtain: 'ceiling=0.5',
    settings: '00000000',
    status: 'done' as const,
    reason: '',
    best: 0.7,
    median: 0.5,
    bestVisible: 0.6,
    optimism: undefined,
    visible: 200,
    batch: 128,
    distinct: 128,
    floor: 0,
    top: 3.32237,
    topKnown: 'published' as const,
    ...parts,
  };
  return { ...row, lift: parts.lift ?? row.best - row.bestVisible };
}

/** Seconds for every row: one more for each seed. */
export function makeSeconds(rows: readonly CellRow[]): Map<string, number> {
  return new Map(rows.map((row) => [cellId(row), 1 + row.seed]));
}
