import { join } from 'node:path';
import { hashOf } from '../harness/canonical.js';
import { type Designs, rowView } from '../harness/designs.js';
import type { Verdict } from '../harness/judge.js';
import type { Kept } from '../harness/plan/plan.js';
import { type CellRow, cellId } from '../harness/row.js';
import type { Space } from '../harness/space.js';
import { writeCsv } from './csv.js';
import { replaceFile } from './ledger.js';

/** Folder, beside the ledger, of what a plan asks to keep of each cell. */
export const keepsakeFolder = 'cells';

/**
 * Writes what the plan keeps of a cell: `….batch.csv`, the designs in the space's own values with true and believed
 * normalized scores, and `….trace.csv`, belief and truth of every design along the climb.
 */
export async function writeKeepsakes(
  folder: string,
  kept: readonly Kept[],
  space: Space,
  { row, batch, trace }: Verdict,
): Promise<void> {
  const stem = join(folder, keepsakeFolder, nameOf(row));
  if (kept.includes('batches') && batch !== undefined) {
    const { proposal, truth, believed, spread } = batch;
    const records = Array.from(truth, (score, i) => ({
      ...designRecord(space, proposal.designs, i),
      true_score: score,
      believed: believed?.[i],
      spread: spread?.[i],
    }));
    const columns = [...space.columns.map(({ name }) => name), 'true_score', 'believed', 'spread'];
    await replaceFile(`${stem}.batch.csv`, await writeCsv(columns, records));
  }
  if (kept.includes('traces') && trace !== undefined) {
    const records = trace.flatMap(({ step, believed, truth }) =>
      Array.from(truth, (score, i) => ({ step, design: i + 1, believed: believed[i], true_score: score })),
    );
    await replaceFile(
      `${stem}.trace.csv`,
      await writeCsv(['step', 'design', 'believed', 'true_score'], records),
    );
  }
}

/** Readable and unique: labels for people, a hash of the whole identity for the rest. */
function nameOf(row: CellRow): string {
  return `${row.task}_${row.method}_${row.seed}_${hashOf(cellId(row)).slice(0, 8)}`;
}

function designRecord(space: Space, designs: Designs, i: number): Record<string, string | number> {
  const values = rowView(designs, i);
  const entries = space.columns.map((column, j): [string, string | number] => {
    const value = values[j]!;
    return [column.name, column.kind === 'category' ? column.levels[value]! : value];
  });
  return Object.fromEntries(entries);
}
