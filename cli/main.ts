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
  commands: ['rehearse', 'list'],
  options: ['out', 'workers', 'seeds', 'help', 'version'],
};

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
        .option('out', { type: 'string', requiresArg: true, describe: 'output folder [default: out/<plan>]' })
        .option('workers', { type: 'string', requiresArg: true, describe: 'worker threads [default: cores]' })
        .option('seeds', { type: 'string', requiresArg: true, describe: "repeats, instead of the plan's" }),
    async (given) => {
      const { rehearse } = await import('./rehearse.js');
      process.exitCode = await rehearse(given);
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
  .parserConfiguration({ 'duplicate-arguments-array': false, 'boolean-negation': false })
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
