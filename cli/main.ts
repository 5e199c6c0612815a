#!/usr/bin/env node
import yargs from 'yargs';
import { hideBin } from 'yargs/helpers';
import { OnebatchError } from '../harness/errors.js';
import { exitCodes } from './exit-codes.js';
import { version } from './package-root.js';
import { sectionNames } from './section-names.js';
import { remark } from './terminal.js';

const program = yargs(hideBin(process.argv))
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
        .option('workers', { type: 'number', requiresArg: true, describe: 'worker threads [default: cores]' })
        .option('seeds', { type: 'number', requiresArg: true, describe: "repeats, instead of the plan's" }),
    async (given) => {
      const { rehearse } = await import('./rehearse.js');
      process.exitCode = await rehearse(given);
    },
  )
  .command(
    'list [section]',
    'show tasks and methods with their settings and sources',
    (command) => command.positional('section', { choices: sectionNames, describe: 'show this section only' }),
    async ({ section }) => {
      const { list } = await import('./list.js');
      process.exitCode = list(section);
    },
  )
  .demandCommand(1, 'name a command; see onebatch --help')
  .recommendCommands()
  .strict()
  .version(version)
  .wrap(96)
  .fail((message, error) => {
    throw error ?? new OnebatchError('bad-input', message);
  });

try {
  await program.parseAsync();
} catch (error) {
  if (!(error instanceof OnebatchError)) throw error;
  remark(error.message);
  process.exitCode = exitCodes.badInput;
}
