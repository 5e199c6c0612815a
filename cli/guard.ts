import { writeFile } from 'node:fs/promises';
import { OnebatchError } from '../harness/errors.js';
import { renderGuardError, renderGuardJunit } from '../results/guard/junit-report.js';
import type { GuardSide } from '../results/guard/side.js';
import { renderGuard } from '../results/guard/terminal.js';
import { type GuardScore, guardLedgers, guardScores } from '../results/guard.js';
import { manifestName } from '../results/manifest.js';
import { defaultMargin } from '../results/paired.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { type FoundLedger, readLedgers } from './read-ledgers.js';
import { oneOf, readMargin } from './read-options.js';
import { say } from './terminal.js';

/** What a person may type after `onebatch guard`. */
export interface GuardArguments {
  readonly baseline?: string | undefined;
  readonly candidate?: string | undefined;
  readonly margin?: string | undefined;
  readonly score?: string | undefined;
  readonly methods?: string | undefined;
  readonly strict?: boolean | undefined;
  readonly junit?: string | undefined;
}

/**
 * Looks for methods that lost against an earlier ledger of the same plan. The XML report, if one is asked for, is
 * written in any case, also where the ledgers can't be paired.
 *
 * @throws OnebatchError (`bad-input`, `bad-ledger`) with one clear line.
 */
export async function guard(given: GuardArguments): Promise<ExitCode> {
  const score = oneOf('--score', given.score ?? 'best', guardScores) as GuardScore;
  const margin = readMargin(given.margin) ?? defaultMargin;
  if (given.junit === '') throw new OnebatchError('bad-input', '--junit: is empty; name a file');
  const { methods, strict = false, junit } = given;
  try {
    const [baseline, candidate] = await readSides([given.baseline ?? '', given.candidate ?? '']);
    const report = guardLedgers(baseline, candidate, { margin, score, methods, strict });
    if (junit !== undefined) await writeReport(junit, renderGuardJunit(report));
    say(renderGuard(report).trimEnd());
    return report.passed ? exitCodes.done : exitCodes.regression;
  } catch (error) {
    if (junit !== undefined && error instanceof OnebatchError)
      await writeReport(junit, renderGuardError(error.message));
    throw error;
  }
}

async function readSides(folders: readonly [string, string]): Promise<[GuardSide, GuardSide]> {
  const [before, after] = await readLedgers(folders);
  return [sideOf(before!), sideOf(after!)];
}

function sideOf({ place, provenance, rows }: FoundLedger): GuardSide {
  if (provenance !== undefined) return { name: place, provenance, rows };
  throw new OnebatchError(
    'bad-ledger',
    `${place}: holds no ${manifestName}, so its plan isn't known; name a folder that a rehearsal wrote`,
  );
}

async function writeReport(file: string, text: string): Promise<void> {
  try {
    await writeFile(file, text);
  } catch (cause) {
    const { code } = cause as NodeJS.ErrnoException;
    throw new OnebatchError('bad-input', `--junit: ${file} can't be written (${code})`, { cause });
  }
}
