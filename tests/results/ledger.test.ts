import { appendFile, readdir, readFile, rm, truncate, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { OnebatchError } from '../../harness/errors.js';
import { type CellRow, cellId } from '../../harness/row.js';
import { Ledger, ledgerName, readLedger, timingsName } from '../../results/ledger.js';
import { ledgerColumns } from '../../results/ledger-columns.js';
import { anyRow } from './any-row.js';
import { makeRow } from './made-ledger.js';
import { freshFolder, withFolder } from './temporary-folder.js';

const rows = [1, 2, 3].flatMap((seed) =>
  ['repeat-best', 'jitter'].map((method) => makeRow({ method, seed, best: 0.1 * seed })),
);
const someRows = fc.uniqueArray(anyRow, { selector: cellId, minLength: 1, maxLength: 8 });

async function fill(folder: string, given: readonly CellRow[]): Promise<void> {
  const ledger = await Ledger.open(folder);
  for (const row of given) await ledger.append(row, row.seed / 8);
  await ledger.close();
}

const textOf = (folder: string, name: string = ledgerName) => readFile(join(folder, name), 'utf8');

async function refusal(action: Promise<unknown>): Promise<string> {
  const error = await action.then(
    () => undefined,
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(OnebatchError);
  expect((error as OnebatchError).code).toBe('bad-ledger');
  return (error as OnebatchError).message;
}

describe('a ledger', () => {
  test('begins as a header without rows', () =>
    withFolder(async (folder) => {
      const ledger = await Ledger.open(folder);
      expect(ledger.rows).toEqual([]);
      await ledger.close();
      expect(await textOf(folder)).toBe(`${ledgerColumns.join(',')}\n`);
    }));

  test('reopened holds the rows that were appended, to the last bit, and their seconds', () =>
    withFolder((root) =>
      fc.assert(
        fc.asyncProperty(someRows, async (given) => {
          const folder = await freshFolder(root);
          await fill(folder, given);
          const ledger = await Ledger.open(folder);
          expect(ledger.rows).toStrictEqual(given);
          const seconds = given.map((row) => [cellId(row), Number((row.seed / 8).toFixed(3))]);
          expect(new Map(ledger.seconds)).toEqual(new Map(seconds as [string, number][]));
          await ledger.close();
        }),
        { numRuns: 40 },
      ),
    ));

  test('keeps the same seconds in memory and on the disk', () =>
    withFolder(async (folder) => {
      const ledger = await Ledger.open(folder);
      await ledger.append(rows[0]!, 0.123456);
      await ledger.close();
      const expected = new Map([[cellId(rows[0]!), 0.123]]);
      expect(ledger.seconds).toEqual(expected);
      expect((await readLedger(folder)).seconds).toEqual(expected);
    }));

  test('has a row on the disk when append resolves', () =>
    withFolder(async (folder) => {
      const ledger = await Ledger.open(folder);
      for (const [i, row] of rows.entries()) {
        await ledger.append(row, 1);
        expect((await readLedger(folder)).rows).toEqual(rows.slice(0, i + 1));
      }
      await ledger.close();
    }));

  test('cut off anywhere drops the unfinished line and nothing else, and can be gone on with', () =>
    withFolder(async (root) => {
      await fill(root, rows);
      const text = await textOf(root);
      const lines = text.split('\n');
      const bytes = Buffer.from(text);
      for (let length = 0; length <= bytes.length; length += 17) {
        const whole = Math.max(0, text.slice(0, length).split('\n').length - 2);
        await writeFile(join(root, ledgerName), bytes);
        await truncate(join(root, ledgerName), length);
        expect((await Ledger.open(root).then(closed)).rows).toEqual(rows.slice(0, whole));
        expect(await textOf(root)).toBe(`${lines.slice(0, whole + 1).join('\n')}\n`);
        await fill(root, rows.slice(whole));
        expect(await textOf(root)).toBe(text);
      }
    }));

  test('drops an unfinished last line of its timings too, and does without them', () =>
    withFolder(async (folder) => {
      await fill(folder, rows);
      await appendFile(join(folder, timingsName), 'hartmann-6,ceiling');
      expect((await Ledger.open(folder).then(closed)).seconds.size).toBe(rows.length);
      await rm(join(folder, timingsName));
      const ledger = await Ledger.open(folder).then(closed);
      expect(ledger.rows).toEqual(rows);
      expect(ledger.seconds.size).toBe(0);
    }));

  test('sorted stands in the given order, whichever cell finished first, and leaves no other file', () =>
    withFolder((root) =>
      fc.assert(
        fc.asyncProperty(fc.shuffledSubarray(rows, { minLength: rows.length }), async (shuffled) => {
          const folder = await freshFolder(root);
          const ledger = await Ledger.open(folder);
          for (const row of shuffled) await ledger.append(row, 1);
          await ledger.sort(rows.map(cellId));
          await ledger.close();
          expect(ledger.rows).toEqual(rows);
          expect((await readLedger(folder)).rows).toEqual(rows);
          expect((await readdir(folder)).sort()).toEqual([ledgerName, timingsName]);
        }),
        { numRuns: 10 },
      ),
    ));

  test('sorted is the same bytes as one that was filled in order', () =>
    withFolder(async (root) => {
      const [one, other] = [await freshFolder(root), await freshFolder(root)];
      await fill(one, rows);
      const ledger = await Ledger.open(other);
      for (const row of rows.toReversed()) await ledger.append(row, 2);
      await ledger.sort(rows.map(cellId));
      await ledger.close();
      expect(await textOf(other)).toBe(await textOf(one));
    }));
});

describe('a ledger is refused', () => {
  const damaged = (change: (lines: string[]) => void) =>
    withFolder(async (folder) => {
      await fill(folder, rows);
      const lines = (await textOf(folder)).split('\n');
      change(lines);
      await writeFile(join(folder, ledgerName), lines.join('\n'));
      const message = await refusal(Ledger.open(folder));
      expect(message.startsWith(folder)).toBe(true);
      expect(message).not.toContain('\n');
      return message.slice(folder.length + 1);
    });

  test('with a damaged value: file, line and column', async () => {
    expect(await damaged((lines) => lines.splice(3, 1, lines[3]!.replace(',0.2,', ',o.2,')))).toBe(
      'ledger.csv:4: column "best" holds "o.2", which is not what belongs there; remove the line and run the plan again',
    );
  });

  test('with a line that ends too soon', async () => {
    expect(await damaged((lines) => lines.splice(2, 1, lines[2]!.split(',').slice(0, -1).join()))).toMatch(
      /^ledger\.csv:3: column "top_known" holds "", which is not/,
    );
  });

  test('with a line that holds more than it should', async () => {
    expect(await damaged((lines) => lines.splice(2, 1, `${lines[2]},1`))).toBe(
      'ledger.csv:3: has 19 values for 18 columns; remove the line and run the plan again',
    );
  });

  test('with an empty line', async () => {
    expect(await damaged((lines) => lines.splice(2, 0, ''))).toMatch(
      /^ledger\.csv:3: column "task" holds ""/,
    );
  });

  test('with a cell that stands there twice: both lines', async () => {
    expect(await damaged((lines) => lines.splice(5, 0, lines[2]!))).toBe(
      'ledger.csv:6: the same cell as on line 3; remove one of the two',
    );
  });

  test('with another header', async () => {
    expect(await damaged((lines) => lines.splice(0, 1, 'name,score'))).toBe(
      'ledger.csv:1: the header is not that of a ledger; is this the right file?',
    );
  });

  test('with quotes that do not close', async () => {
    expect(await damaged((lines) => lines.splice(4, 1, `"${lines[4]}`))).toBe(
      "ledger.csv: is damaged, it can't be read as CSV; mend it or rehearse anew",
    );
  });

  test('where there is none', () =>
    withFolder(async (folder) => {
      expect(await refusal(readLedger(folder))).toBe(
        `${join(folder, ledgerName)}: can't be read; name a folder that a rehearsal wrote`,
      );
    }));
});

test('readLedger passes over an unfinished last line and changes nothing', () =>
  withFolder(async (folder) => {
    await fill(folder, rows);
    await appendFile(join(folder, ledgerName), 'hartmann-6,ceil');
    const before = await textOf(folder);
    expect((await readLedger(folder)).rows).toEqual(rows);
    expect(await textOf(folder)).toBe(before);
  }));

async function closed(ledger: Ledger): Promise<Ledger> {
  await ledger.close();
  return ledger;
}
