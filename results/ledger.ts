import { existsSync } from 'node:fs';
import { type FileHandle, open, readFile, rename, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { OnebatchError } from '../harness/errors.js';
import { type CellRow, cellId } from '../harness/row.js';
import { readCsv, writeCsv } from './csv.js';
import { fromRecord, ledgerColumns, toRecord } from './ledger-columns.js';

export const ledgerName = 'ledger.csv';
export const timingsName = 'timings.csv';

const timingColumns = ['task', 'curtain', 'method', 'settings', 'seed', 'seconds'] as const;

/**
 * The rows of a rehearsal on disk. A row is on the disk before `append` resolves. A half-written last line, as a
 * power cut leaves it, is dropped when the ledger is opened, so its cell is done again.
 */
export class Ledger {
  readonly #folder: string;
  readonly #rows: CellRow[];
  readonly #seconds: Map<string, number>;
  readonly #ledgerFile: FileHandle;
  readonly #timingsFile: FileHandle;

  private constructor(
    folder: string,
    rows: CellRow[],
    seconds: Map<string, number>,
    ledgerFile: FileHandle,
    timingsFile: FileHandle,
  ) {
    this.#folder = folder;
    this.#rows = rows;
    this.#seconds = seconds;
    this.#ledgerFile = ledgerFile;
    this.#timingsFile = timingsFile;
  }

  /**
   * Opens the ledger of a folder that exists, or begins one.
   *
   * @throws OnebatchError (`bad-ledger`) when a whole line can't be read or a cell stands there twice.
   */
  static async open(folder: string): Promise<Ledger> {
    const files = [join(folder, ledgerName), join(folder, timingsName)] as const;
    await makeWhole(files[0], ledgerColumns);
    await makeWhole(files[1], timingColumns);
    const { rows, seconds } = await readLedger(folder);
    return new Ledger(folder, rows, seconds, await open(files[0], 'a'), await open(files[1], 'a'));
  }

  get rows(): readonly CellRow[] {
    return this.#rows;
  }

  /** Seconds that the method took, by cell identity. */
  get seconds(): ReadonlyMap<string, number> {
    return this.#seconds;
  }

  /** Adds a finished cell and flushes it to the disk. Seconds are kept to the thousandth, as they are on the disk. */
  async append(row: CellRow, seconds: number): Promise<void> {
    const timing = { ...row, seconds: seconds.toFixed(3) };
    await this.#timingsFile.appendFile(await writeCsv(timingColumns, [timing], { header: false }));
    await this.#ledgerFile.appendFile(await writeCsv(ledgerColumns, [toRecord(row)], { header: false }));
    await this.#ledgerFile.datasync();
    this.#rows.push(row);
    this.#seconds.set(cellId(row), Number(timing.seconds));
  }

  /**
   * Puts the rows into the given order of cell identities and writes the ledger anew in one step, so that its bytes do
   * not depend on which cell happened to finish first.
   */
  async sort(order: Iterable<string>): Promise<void> {
    const place = new Map<string, number>();
    for (const id of order) place.set(id, place.size);
    this.#rows.sort((a, b) => (place.get(cellId(a)) ?? 0) - (place.get(cellId(b)) ?? 0));
    await replaceFile(
      join(this.#folder, ledgerName),
      await writeCsv(ledgerColumns, this.#rows.map(toRecord)),
    );
  }

  async close(): Promise<void> {
    await this.#ledgerFile.close();
    await this.#timingsFile.close();
  }
}

/**
 * Reads the ledger in a folder without changing it; an unfinished last line is passed over.
 *
 * @throws OnebatchError (`bad-ledger`) when there is none, a line can't be read, or a cell stands there twice.
 */
export async function readLedger(folder: string): Promise<{ rows: CellRow[]; seconds: Map<string, number> }> {
  const file = join(folder, ledgerName);
  const rows: CellRow[] = [];
  const lines = new Map<string, number>();
  const [header = [], ...records] = await readLines(file);
  if (header.join() !== ledgerColumns.join()) {
    throw new OnebatchError(
      'bad-ledger',
      `${file}:1: the header is not that of a ledger; is this the right file?`,
    );
  }
  records.forEach((values, i) => {
    if (values.length > header.length) {
      throw new OnebatchError(
        'bad-ledger',
        `${file}:${i + 2}: has ${values.length} values for ${header.length} columns; remove the line and run the plan again`,
      );
    }
    const record = Object.fromEntries(header.map((column, k) => [column, values[k] ?? '']));
    const row = fromRecord(record, file, i + 2);
    const id = cellId(row);
    if (lines.has(id)) {
      throw new OnebatchError(
        'bad-ledger',
        `${file}:${i + 2}: the same cell as on line ${lines.get(id)}; remove one of the two`,
      );
    }
    lines.set(id, i + 2);
    rows.push(row);
  });
  return { rows, seconds: await readTimings(join(folder, timingsName)) };
}

/** Nothing depends on times: a ledger that was passed on without them is whole. */
async function readTimings(file: string): Promise<Map<string, number>> {
  if (!existsSync(file)) return new Map();
  const [, ...records] = await readLines(file);
  return new Map(
    records.map(([task = '', curtain = '', method = '', settings = '', seed, seconds]) => [
      cellId({ task, curtain, method, settings, seed: Number(seed) }),
      Number(seconds),
    ]),
  );
}

async function readLines(file: string): Promise<string[][]> {
  let text: string;
  try {
    text = await readFile(file, 'utf8');
  } catch (cause) {
    throw new OnebatchError('bad-ledger', `${file}: can't be read; name a folder that a rehearsal wrote`, {
      cause,
    });
  }
  try {
    return await readCsv(text.slice(0, text.lastIndexOf('\n') + 1));
  } catch (cause) {
    throw new OnebatchError(
      'bad-ledger',
      `${file}: is damaged, it can't be read as CSV; mend it or rehearse anew`,
      {
        cause,
      },
    );
  }
}

/** Gives a new CSV file its header, and an old one a whole last line. */
async function makeWhole(file: string, columns: readonly string[]): Promise<void> {
  const text = await readFile(file, 'utf8').catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return '';
    throw error;
  });
  const whole = text.slice(0, text.lastIndexOf('\n') + 1);
  if (whole === '') await writeFile(file, await writeCsv(columns, []));
  else if (whole.length < text.length) await replaceFile(file, whole);
}

/** Writes a file under another name and puts it in place in one step. */
export async function replaceFile(file: string, text: string): Promise<void> {
  const draft = `${file}.new`;
  const handle = await open(draft, 'w');
  try {
    await handle.writeFile(text);
    await handle.sync();
  } finally {
    await handle.close();
  }
  await rename(draft, file);
}
