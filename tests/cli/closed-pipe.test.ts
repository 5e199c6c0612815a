import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { expect, test } from 'vitest';

const main = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url));
const run = promisify(execFile);

test.skipIf(process.platform === 'win32')(
  'a rehearsal whose reader went away goes on to its end, as in "onebatch rehearse plan.yaml 2>&1 | head -1"',
  async () => {
    const folder = await mkdtemp(join(tmpdir(), 'onebatch-pipe-'));
    try {
      await writeFile(
        join(folder, 'plan.yaml'),
        'seeds: 3\npool: 60\nbatch: 4\ntasks: [branin]\nmethods: [repeat-best, jitter]\n',
      );
      const words = `"${process.execPath}" "${main}" rehearse plan.yaml --out run 2>&1 | head -1`;
      const { stdout } = await run('sh', ['-c', words], { cwd: folder });
      expect(stdout).toMatch(/^Rehearsing "plan": 6 cells.*\n$/);
      expect((await readFile(join(folder, 'run', 'ledger.csv'), 'utf8')).split('\n')).toHaveLength(8);
      expect(await readFile(join(folder, 'run', 'comparison.md'), 'utf8')).toContain('branin');
    } finally {
      await rm(folder, { recursive: true });
    }
  },
);
