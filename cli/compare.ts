import { mkdir } from 'node:fs/promises';
import { join } from 'node:path';
import { OnebatchError } from '../harness/errors.js';
import { type Comparison, compareRows } from '../results/comparison.js';
import { replaceFile } from '../results/ledger.js';
import { mergeLedgers } from '../results/merge-ledgers.js';
import { type PairedScore, pairedScores } from '../results/paired.js';
import { mergeSweepPlans, reportedLabels, sweepPlanOf } from '../results/sweep/sweep-plan.js';
import { rowsToReport } from '../results/sweep.js';
import { tableFormats } from '../results/tables/index.js';
import { renderTerminal } from '../results/tables/terminal.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { version } from './package-root.js';
import { type FoundLedger, readLedgers } from './read-ledgers.js';
import { oneOf, readMargin } from './read-options.js';
import { inStyle, remark, say } from './terminal.js';

/** What a person may type after `onebatch compare`. */
export interface CompareArguments {
  readonly ledgers?: readonly string[] | undefined;
  readonly against?: string | undefined;
  readonly margin?: string | undefined;
  readonly score?: string | undefined;
  readonly format?: string | undefined;
  readonly sameCells?: boolean | undefined;
  readonly out?: string | undefined;
}

const formatNames = ['terminal', ...tableFormats.map(({ name }) => name)];

/**
 * Compares the methods of one or more ledgers: shows the tables in the format asked for, and writes all of them into
 * the folder, if one is named.
 *
 * @throws OnebatchError (`bad-input`, `bad-ledger`) with one clear line.
 */
export async function compare(given: CompareArguments): Promise<ExitCode> {
  const format = oneOf('--format', given.format ?? 'terminal', formatNames);
  const score = oneOf('--score', given.score ?? 'best', pairedScores) as PairedScore;
  const margin = readMargin(given.margin);
  if (given.out === '') throw new OnebatchError('bad-input', '--out: is empty; name a folder');
  const ledgers = await readLedgers(given.ledgers ?? []);
  const plans = ledgers.map(({ provenance }) => provenance?.plan);
  const merged = mergeLedgers(ledgers);
  const { rows, seconds, sweeps } = rowsToReport(
    merged.rows,
    mergeSweepPlans(plans.map((plan) => plan && sweepPlanOf(plan))),
    { seconds: merged.seconds, score, sameCells: given.sameCells ?? false },
  );
  const [plan] = plans;
  const comparison = compareRows(rows, {
    version,
    seconds,
    against: given.against,
    margin,
    score,
    looks: looksOf(ledgers),
    sweeps,
    ...(plan === undefined
      ? {}
      : {
          seed: plan.seed,
          order: { tasks: plan.tasks.map(({ label }) => label), methods: reportedLabels(plan) },
        }),
  });
  say((await render(comparison, format)).trimEnd());
  if (given.out !== undefined) await writeAll(comparison, given.out);
  return exitCodes.done;
}

/**
 * The looks that ended these rehearsals, which must be the same for all: otherwise the number of seeds of each would
 * depend on its scores in its own way, and nothing could be promised of verdicts over both.
 */
function looksOf(ledgers: readonly FoundLedger[]): readonly number[] | undefined {
  const looks = ledgers.map(({ provenance }) => provenance?.plan.looks);
  const other = looks.findIndex((those) => those?.join() !== looks[0]?.join());
  if (other < 0) return looks[0];
  throw new OnebatchError(
    'bad-input',
    `${ledgers[0]!.place} and ${ledgers[other]!.place}: one was rehearsed until decided and the other was not, or with other looks; compare each alone`,
  );
}

async function render(comparison: Comparison, format: string): Promise<string> {
  const file = tableFormats.find(({ name }) => name === format);
  return file === undefined
    ? renderTerminal(comparison, { style: inStyle(), full: true })
    : file.render(comparison);
}

async function writeAll(comparison: Comparison, folder: string): Promise<void> {
  try {
    await mkdir(folder, { recursive: true });
    for (const { file, render: write } of tableFormats)
      await replaceFile(join(folder, file), await write(comparison));
  } catch (cause) {
    const { code } = cause as NodeJS.ErrnoException;
    if (code === undefined) throw cause;
    throw new OnebatchError('bad-input', `--out: ${folder} can't be used as output folder (${code})`, {
      cause,
    });
  }
  remark(`Wrote ${tableFormats.map(({ file }) => file).join(', ')} into ${folder}.`);
}
