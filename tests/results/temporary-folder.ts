import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Runs with a folder of its own, which is gone afterwards. */
export async function withFolder<T>(use: (folder: string) => Promise<T>): Promise<T> {
  const folder = await mkdtemp(join(tmpdir(), 'onebatch-test-'));
  try {
    return await use(folder);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** A new empty folder inside another. */
export function freshFolder(root: string): Promise<string> {
  return mkdtemp(join(root, 'fresh-'));
}
