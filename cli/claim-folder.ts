import { mkdir, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { OnebatchError } from '../harness/errors.js';
import { ledgerName } from '../results/ledger.js';
import { differences, type Provenance, readManifest, writeManifest } from '../results/manifest.js';

/** Differences shown before the rest is only counted. */
const mostShown = 4;

/**
 * Makes the output folder this rehearsal's own: a new one gets its manifest, an old one must hold the same plan, made
 * by the same program, or numbers that can't be compared would stand in one ledger.
 *
 * @throws OnebatchError (`bad-input`) saying what changed.
 */
export async function claimFolder(folder: string, provenance: Provenance): Promise<void> {
  try {
    await mkdir(folder, { recursive: true });
    const before = await readManifest(folder);
    if (before === undefined) {
      if (await exists(join(folder, ledgerName))) refuse(folder, 'holds a ledger without a manifest');
      await writeManifest(folder, provenance);
      return;
    }
    const changes = differences(before, provenance);
    if (changes.length > 0) refuse(folder, `holds a rehearsal of something else (${listed(changes)})`);
  } catch (cause) {
    const { code } = cause as NodeJS.ErrnoException;
    if (cause instanceof OnebatchError || code === undefined) throw cause;
    throw new OnebatchError('bad-input', `${folder}: can't be used as output folder (${code})`, { cause });
  }
}

function refuse(folder: string, why: string): never {
  throw new OnebatchError('bad-input', `${folder} ${why}; name a new folder with --out, or remove this one`);
}

function listed(changes: readonly string[]): string {
  const more = changes.length - mostShown;
  return [...changes.slice(0, mostShown), ...(more > 0 ? [`and ${more} more`] : [])].join('; ');
}

async function exists(file: string): Promise<boolean> {
  return stat(file).then(
    () => true,
    () => false,
  );
}
