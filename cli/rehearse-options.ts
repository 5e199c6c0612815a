import { readFile } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import type { Catalogue } from '../harness/catalogue.js';
import { OnebatchError } from '../harness/errors.js';
import { checkHalves, hasSweeps } from '../harness/plan/halves.js';
import { planLooks } from '../harness/plan/looks.js';
import type { Plan } from '../harness/plan/plan.js';
import { readPlan } from '../harness/plan/read.js';
import { packageRoot } from './package-root.js';

/** What a person may type after `onebatch rehearse`. */
export interface RehearseArguments {
  readonly plan?: string | undefined;
  readonly out?: string | undefined;
  readonly workers?: string | undefined;
  readonly seeds?: string | undefined;
  readonly untilDecided?: boolean | undefined;
  readonly mostSeeds?: string | undefined;
  readonly sameCells?: boolean | undefined;
}

/** What there is to rehearse, where and how. */
export interface Rehearsal {
  readonly plan: Plan;
  readonly out: string;
  readonly workers: number;
  /** Whether the plan's sweeps are chosen on the cells that are reported. */
  readonly sameCells: boolean;
}

/** Rounds of seeds that `--until-decided` allows unless `--most-seeds` says otherwise. */
const defaultRounds = 8;

/** Seeds a plan can have at most. */
const seedsLimit = 100_000;

/** The plan that is run when none is named. */
export const demoPlan: string = join(packageRoot, 'cli', 'demo.plan.yaml');

/**
 * Reads the plan and puts the command line's words over it.
 *
 * @throws OnebatchError (`bad-input`, `bad-plan`) with one clear line for each problem.
 */
export async function readRehearsal(given: RehearseArguments, catalogue: Catalogue): Promise<Rehearsal> {
  const file = given.plan ?? demoPlan;
  if (given.out === '') throw new OnebatchError('bad-input', '--out: is empty; name a folder');
  const plan = readPlan(await readText(file), file, catalogue);
  const seeds = wholeNumber('--seeds', given.seeds, seedsLimit) ?? plan.seeds;
  return {
    plan: { ...plan, seeds, ...readLooks(given, { ...plan, seeds }) },
    sameCells: readSameCells(given, { ...plan, seeds }),
    out: given.out ?? join('out', plan.name),
    workers: wholeNumber('--workers', given.workers, 256) ?? availableParallelism(),
  };
}

/** The most seeds, and when to look at the verdicts before that; nothing where all seeds are run in any case. */
function readLooks(
  { untilDecided = false, mostSeeds }: RehearseArguments,
  plan: Plan,
): Pick<Plan, 'seeds' | 'looks'> | undefined {
  if (!untilDecided) {
    if (mostSeeds === undefined) return undefined;
    throw new OnebatchError('bad-input', '--most-seeds: needs --until-decided; without it, say --seeds');
  }
  if (hasSweeps(plan))
    throw new OnebatchError(
      'bad-input',
      '--until-decided: the plan sweeps settings, and what is compared would change between looks; rehearse the sweep with --seeds first, then the chosen settings until decided, with another seed in the plan',
    );
  const { seeds } = plan;
  const most =
    wholeNumber('--most-seeds', mostSeeds, seedsLimit) ?? Math.min(defaultRounds * seeds, seedsLimit);
  if (most < seeds)
    throw new OnebatchError(
      'bad-input',
      `--most-seeds: is ${most}, fewer than the ${seeds} seeds of a round; give --seeds a smaller number`,
    );
  return { seeds: most, looks: planLooks(seeds, most) };
}

function readSameCells({ sameCells = false }: RehearseArguments, plan: Plan): boolean {
  if (!sameCells) checkHalves(plan);
  else if (!hasSweeps(plan))
    throw new OnebatchError('bad-input', '--same-cells: the plan sweeps no setting; leave it out');
  return sameCells;
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
