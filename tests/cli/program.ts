import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const main = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url));

if (!existsSync(main)) {
  throw new Error('dist/cli/main.js is missing; run "npm run build" first, as "npm test" does');
}

/** How a run of the program ended. */
export interface Ending {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** Runs `onebatch` as built, its output going to pipes; `meanwhile` may watch it and send it signals. */
export async function onebatch(
  folder: string,
  words: readonly string[],
  meanwhile: (program: ChildProcess) => Promise<void> = () => Promise.resolve(),
): Promise<Ending> {
  const program = spawn(process.execPath, [main, ...words], {
    cwd: folder,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: { ...process.env, NO_COLOR: undefined, FORCE_COLOR: undefined },
  });
  let stdout = '';
  let stderr = '';
  program.stdout.setEncoding('utf8').on('data', (text: string) => {
    stdout += text;
  });
  program.stderr.setEncoding('utf8').on('data', (text: string) => {
    stderr += text;
  });
  const ended = new Promise<Ending>((resolve, reject) => {
    program.on('error', reject);
    program.on('close', (code, signal) => resolve({ code, signal, stdout, stderr }));
  });
  try {
    await meanwhile(program);
    return await ended;
  } finally {
    program.kill('SIGKILL');
  }
}

/** Sends a signal when the ledger in the output folder holds that many rows. */
export function signalAt(folder: string, rows: number, signal: NodeJS.Signals) {
  return async (program: ChildProcess): Promise<void> => {
    while (program.exitCode === null && program.signalCode === null) {
      const text = await readFile(join(folder, 'ledger.csv'), 'utf8').catch(() => '');
      if (text.split('\n').length - 2 >= rows) {
        program.kill(signal);
        return;
      }
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
  };
}
