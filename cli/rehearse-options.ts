import { readFile } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import type { Catalogue } from '../harness/catalogue.js';
import { OnebatchError } from '../harness/errors.js';
import type { Plan } from '../harness/plan/plan.js';
import { readPlan } from '../harness/plan/read.js';
import { packageRoot } from './package-root.js';

/** What a person may type after `onebatch rehearse`. */
export interface RehearseArguments {
  readonly plan?: string | undefined;
  readonly out?: string | undefined;
  readonly workers?: string | undefined;
  readonly seeds?: string | undefined;
}

/** The plan that is run when none is named. */
export const demoPlan: string = join(packageRoot, 'cli', 'demo.plan.yaml');

/**
 * Reads the plan and puts the command line's words over it.
 *
 * @throws OnebatchError (`bad-input`, `bad-plan`) with one clear line for each problem.
 */
export async function readRehearsal(
  given: RehearseArguments,
  catalogue: Catalogue,
): Promise<{ plan: Plan; out: string; workers: number }> {
  const file = given.plan ?? demoPlan;
  if (given.out === '') throw new OnebatchError('bad-input', '--out: is empty; name a folder');
  const plan = readPlan(await readText(file), file, catalogue);
  const seeds = wholeNumber('--seeds', given.seeds, 100_000) ?? plan.seeds;
  return {
    plan: { ...plan, seeds },
    out: given.out ?? join('out', plan.name),
    workers: wholeNumber('--workers', given.workers, 256) ?? availableParallelism(),
  };
}

async function readText(file: string): Promise<string> {
  try {
    return await readFile(file, 'utf8');
  } catch (cause) {
    const { code } = cause as NodeJS.ErrnoException;
    const why = reasons[code ?? ''] ?? `can't be read (${code})`;
    throw new OnebatchError('bad-input', `${file}: ${why}`, { cause });
  }
}

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such plan file; check the path, or leave it out to run the demo',
  EACCES: 'you may not read this file; check its permissions',
  EISDIR: 'is a folder; name a plan file',
};

function wholeNumber(option: string, text: string | undefined, most: number): number | undefined {
  if (text === undefined) return undefined;
  const value = /^\d+$/.test(text) ? Number(text) : Number.NaN;
  if (value >= 1 && value <= most) return value;
  throw new OnebatchError('bad-input', `${option}: is "${text}", must be a whole number from 1 to ${most}`);
}
