import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { canonicalJson, hashOf } from '../harness/canonical.js';
import { OnebatchError } from '../harness/errors.js';
import type { Plan } from '../harness/plan/plan.js';
import { replaceFile } from './ledger.js';

export const manifestName = 'manifest.json';

/** What fixes a ledger's numbers. */
export interface Provenance {
  readonly plan: Plan;
  /** Version of this program. */
  readonly program: string;
  readonly node: string;
  /** The numeric backend of the networks, with its version. */
  readonly backend: string;
}

/** Writes `manifest.json`: each part of the provenance with its SHA-256. */
export async function writeManifest(folder: string, provenance: Provenance): Promise<void> {
  const parts = Object.entries(provenance).map(([name, value]) => [name, { sha256: hashOf(value), value }]);
  await replaceFile(join(folder, manifestName), `${JSON.stringify(Object.fromEntries(parts), null, 2)}\n`);
}

/** The provenance of the ledger in a folder; `undefined` when the folder holds no manifest. */
export async function readManifest(folder: string): Promise<Provenance | undefined> {
  const file = join(folder, manifestName);
  let text: string;
  try {
    text = await readFile(file, 'utf8');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
    throw error;
  }
  try {
    const parts = JSON.parse(text) as Record<keyof Provenance, { value: unknown }>;
    const { plan, program, node, backend } = parts;
    return {
      plan: plan.value,
      program: program.value,
      node: node.value,
      backend: backend.value,
    } as Provenance;
  } catch (cause) {
    throw new OnebatchError('bad-ledger', `${file}: is damaged; rehearse into a new folder with --out`, {
      cause,
    });
  }
}

/** What differs between two values, as lines `path: old -> new`; empty when nothing does. */
export function differences(before: unknown, after: unknown, path = ''): string[] {
  if (canonicalJson(before) === canonicalJson(after)) return [];
  if (!isGroup(before) || !isGroup(after) || Array.isArray(before) !== Array.isArray(after)) {
    return [`${path || 'all'}: ${show(before)} -> ${show(after)}`];
  }
  const keys = [...new Set([...Object.keys(before), ...Object.keys(after)])];
  return keys.flatMap((key) => {
    const step = Array.isArray(before) ? `[${key}]` : path === '' ? key : `.${key}`;
    return differences(ownValue(before, key), ownValue(after, key), `${path}${step}`);
  });
}

function ownValue(group: Record<string, unknown>, key: string): unknown {
  return Object.hasOwn(group, key) ? group[key] : undefined;
}

function isGroup(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}

function show(value: unknown): string {
  const text = value === undefined ? 'nothing' : JSON.stringify(value);
  return text.length > 60 ? `${text.slice(0, 57)}…` : text;
}
