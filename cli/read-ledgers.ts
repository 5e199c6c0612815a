import { stat } from 'node:fs/promises';
import { basename, dirname } from 'node:path';
import { OnebatchError } from '../harness/errors.js';
import { ledgerName, readLedger } from '../results/ledger.js';
import { type Provenance, readManifest } from '../results/manifest.js';
import type { ReadLedger } from '../results/merge-ledgers.js';

/** A ledger with what its manifest, where there is one, says of its making. */
export interface FoundLedger extends ReadLedger {
  readonly provenance: Provenance | undefined;
}

/**
 * Reads ledgers, each named by its folder or by the path of its `ledger.csv`.
 *
 * @throws OnebatchError (`bad-input`, `bad-ledger`) naming the first that can't be read.
 */
export async function readLedgers(places: readonly string[]): Promise<FoundLedger[]> {
  if (places.length === 0)
    throw new OnebatchError('bad-input', 'name a ledger: the folder that a rehearsal wrote');
  const ledgers: FoundLedger[] = [];
  for (const place of places) {
    const folder = await folderOf(place);
    const { rows, seconds } = await readLedger(folder);
    ledgers.push({ place, rows, seconds, provenance: await readManifest(folder) });
  }
  return ledgers;
}

async function folderOf(place: string): Promise<string> {
  const found = await stat(place).catch(() => undefined);
  if (found === undefined)
    throw new OnebatchError(
      'bad-input',
      `${place}: there is no such ledger; name a folder that a rehearsal wrote`,
    );
  if (found.isDirectory()) return place;
  if (basename(place) === ledgerName) return dirname(place);
  throw new OnebatchError('bad-input', `${place}: is no ledger; name a folder or its ${ledgerName}`);
}
