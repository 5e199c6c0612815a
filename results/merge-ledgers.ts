import { OnebatchError } from '../harness/errors.js';
import { type CellRow, cellId } from '../harness/row.js';

/** The rows of one ledger, with the name that messages call it by. */
export interface ReadLedger {
  readonly place: string;
  readonly rows: readonly CellRow[];
  /** Seconds by cell identity. */
  readonly seconds: ReadonlyMap<string, number>;
}

/**
 * The rows of several ledgers together. A cell that stands in more than one, with the same numbers, is kept once, with
 * the seconds of the first. The same method with other settings is another cell.
 *
 * @throws OnebatchError (`bad-ledger`) for a cell that has other numbers in another ledger.
 */
export function mergeLedgers(ledgers: readonly ReadLedger[]): {
  rows: CellRow[];
  seconds: Map<string, number>;
} {
  const first = new Map<string, { readonly row: CellRow; readonly place: string }>();
  const seconds = new Map<string, number>();
  for (const { place, rows, seconds: times } of ledgers) {
    for (const row of rows) {
      const id = cellId(row);
      const known = first.get(id);
      if (known === undefined) first.set(id, { row, place });
      else refuseDifferent(known, { row, place });
    }
    for (const [id, time] of times) if (!seconds.has(id)) seconds.set(id, time);
  }
  return { rows: [...first.values()].map(({ row }) => row), seconds };
}

interface Placed {
  readonly row: CellRow;
  readonly place: string;
}

function refuseDifferent(a: Placed, b: Placed): void {
  const column = (Object.keys(a.row) as (keyof CellRow)[]).find(
    (name) => !Object.is(a.row[name], b.row[name]),
  );
  if (column === undefined) return;
  const { method, task, curtain, seed } = a.row;
  throw new OnebatchError(
    'bad-ledger',
    `${a.place} and ${b.place} disagree on ${method}, ${task} behind ${curtain}, seed ${seed}: ${column} ${a.row[column]} and ${b.row[column]}; compare ledgers of one plan, or one of the two alone`,
  );
}
