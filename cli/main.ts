#!/usr/bin/env node
import yargs from 'yargs';
import { hideBin } from 'yargs/helpers';
import { OnebatchError } from '../harness/errors.js';
import { exitCodes } from './exit-codes.js';
import { version } from './package-root.js';
import { sectionNames } from './section-names.js';
import { endQuietlyWithoutReader, remark } from './terminal.js';
import { explainUsage } from './usage.js';

const vocabulary = {
  commands: ['rehearse', 'compare', 'guard', 'list'],
  options: [
    'out',
    'workers',
    'seeds',
    'until-decided',
    'most-seeds',
    'same-cells',
    'against',
    'margin',
    'score',
    'format',
    'methods',
    'strict',
    'junit',
    'help',
    'version',
  ],
};

const sameCells = {
  type: 'boolean',
  describe: 'choose the settings of sweeps on the very cells that are reported; tables are marked',
} as const;

/** An option with a value. Given twice, the last counts. */
const word = {
  type: 'string',
  requiresArg: true,
  coerce: (given: string | readonly string[] | undefined) => [given].flat().at(-1),
} as const;

const typed = hideBin(process.argv);
const program = yargs(typed)
  .scriptName('onebatch')
  .locale('en')
  .usage('$0 <command>\n\nRehearse offline model-based optimization on tasks whose truth is known.')
  .command(
    'rehearse [plan]',
    'run a plan, or go on with it, and compare its methods',
    (command) =>
      command
        .positional('plan', { type: 'string', describe: 'plan file; without one, the demo is run' })
        .option('out', { ...word, describe: 'output folder [default: out/<plan>]' })
        .option('workers', { ...word, describe: 'worker threads [default: cores]' })
        .option('seeds', { ...word, describe: "repeats, instead of the plan's" })
        .option('until-decided', {
          type: 'boolean',
          describe: 'add seeds in rounds of so many until every verdict is reached',
        })
        .option('most-seeds', {
          ...word,
          describe: 'with --until-decided: seeds to stop at [default: 8 rounds]',
        })
        .option('same-cells', sameCells),
    async (given) => {
      const { rehearse } = await import('./rehearse.js');
      process.exitCode = await rehearse(given);
    },
  )
  .command(
    'compare [ledgers..]',
    'compare the methods of one or more ledgers',
    (command) =>
      command
        .positional('ledgers', {
          type: 'string',
          array: true,
          describe: 'folders that rehearsals wrote, or their ledger.csv',
        })
        .option('against', {
          ...word,
          describe: 'reference method [default: repeat-best]',
        })
        .option('margin', {
          ...word,
          describe: 'largest difference without meaning, in normalized score [default: 0.02]',
        })
        .option('score', {
          ...word,
          describe: 'best, median or lift [default: best]',
        })
        .option('format', {
          ...word,
          describe: 'terminal, markdown, csv, json or latex [default: terminal]',
        })
        .option('same-cells', sameCells)
        .option('out', { ...word, describe: 'folder to write all formats into' }),
    async (given) => {
      const { compare } = await import('./compare.js');
      process.exitCode = await compare(given);
    },
  )
  .command(
    'guard <baseline> <candidate>',
    'look for methods that lost against an earlier ledger of the same plan',
    (command) =>
      command
        .positional('baseline', { type: 'string', describe: 'folder of the ledger from before the change' })
        .positional('candidate', { type: 'string', describe: 'folder of the ledger from after it' })
        .option('margin', {
          ...word,
          describe: 'largest loss without meaning, in normalized score [default: 0.02]',
        })
        .option('score', { ...word, describe: 'best or median [default: best]' })
        .option('methods', { ...word, describe: 'labels to compare, as a,b [default: all in both]' })
        .option('strict', { type: 'boolean', describe: 'fail where there are too few seeds to show a loss' })
        .option('junit', { ...word, describe: 'file to write an XML report for a build server into' }),
    async (given) => {
      const { guard } = await import('./guard.js');
      process.exitCode = await guard(given);
    },
  )
  .command(
    'list [section]',
    'show tasks and methods with their settings and sources',
    (command) =>
      command.positional('section', {
        type: 'string',
        describe: `show this section only: ${sectionNames.join(', ')}`,
      }),
    async ({ section }) => {
      const { list } = await import('./list.js');
      process.exitCode = list(section);
    },
  )
  .demandCommand(1, 'name a command; see onebatch --help')
  .strict()
  .parserConfiguration({ 'boolean-negation': false })
  .version(version)
  .wrap(96)
  .fail((complaint, error) => {
    if (error instanceof Error && error.name !== 'YError') throw error;
    throw new OnebatchError('bad-input', explainUsage(complaint || error.message, typed, vocabulary));
  });

endQuietlyWithoutReader();
try {
  await program.parseAsync();
} catch (error) {
  if (!(error instanceof OnebatchError)) throw error;
  remark(error.message);
  process.exitCode = exitCodes.badInput;
}
