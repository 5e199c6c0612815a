import { z } from 'zod';
import { OnebatchError } from '../harness/errors.js';
import type { CellRow } from '../harness/row.js';

/** The ledger's columns, in order; those that identify the cell come first. */
export const ledgerColumns = [
  'task',
  'curtain',
  'method',
  'settings',
  'seed',
  'status',
  'reason',
  'best',
  'median',
  'best_visible',
  'lift',
  'optimism',
  'visible',
  'batch',
  'distinct',
  'floor',
  'top',
  'top_known',
] as const;

export type LedgerRecord = Readonly<Record<(typeof ledgerColumns)[number], string>>;

const finite = z.string().regex(/\S/).transform(Number).pipe(z.number());
const whole = finite.pipe(z.int().min(0));

const recordSchema = z.object({
  task: z.string().min(1),
  curtain: z.string().min(1),
  method: z.string().min(1),
  settings: z.string().regex(/^[0-9a-f]{8}$/),
  seed: whole,
  status: z.enum(['done', 'failed']),
  reason: z.string(),
  best: finite,
  median: finite,
  best_visible: finite,
  lift: finite,
  optimism: z.union([z.literal('').transform(() => undefined), finite]),
  visible: whole,
  batch: whole,
  distinct: whole,
  floor: finite,
  top: finite,
  top_known: z.enum(['published', 'exact', 'best-known']),
});

/** A row as texts; numbers are written so that reading them gives the same bits. */
export function toRecord(row: CellRow): LedgerRecord {
  const { bestVisible, topKnown, optimism, ...same } = row;
  const record = { ...same, best_visible: bestVisible, top_known: topKnown, optimism: optimism ?? '' };
  return Object.fromEntries(ledgerColumns.map((column) => [column, write(record[column])])) as LedgerRecord;
}

function write(value: string | number): string {
  return Object.is(value, -0) ? '-0' : String(value);
}

/**
 * A row read back.
 *
 * @param line where it stands in the file, for the message.
 * @throws OnebatchError (`bad-ledger`) naming the file, line and column of a value that can't be read.
 */
export function fromRecord(record: Readonly<Record<string, string>>, file: string, line: number): CellRow {
  const result = recordSchema.safeParse(record);
  if (!result.success) {
    const column = String(result.error.issues[0]!.path[0]);
    const seen = JSON.stringify(record[column] ?? null);
    throw new OnebatchError(
      'bad-ledger',
      `${file}:${line}: column "${column}" holds ${seen}, which is not what belongs there; remove the line and run the plan again`,
    );
  }
  const { best_visible, top_known, ...same } = result.data;
  return { ...same, bestVisible: best_visible, topKnown: top_known };
}
