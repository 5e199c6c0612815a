import { execFileSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { rootStream } from '../../harness/random.js';
import type { CellRow } from '../../harness/row.js';
import { compareRows } from '../../results/comparison.js';
import { medianMilliseconds, report } from './timing.js';

const tasks = 40;
const methods = 25;
const seeds = 100;

/** Made-up rows: methods that differ a little, skewed scores, pools that are easier or harder. */
function makeRows(): CellRow[] {
  const stream = rootStream(1);
  const rows: CellRow[] = [];
  for (let task = 0; task < tasks; task++) {
    for (let seed = 1; seed <= seeds; seed++) {
      const bestVisible = 0.5 + 0.1 * stream.normal();
      for (let method = 0; method < methods; method++) {
        const best = bestVisible + 0.01 * method + 0.05 * stream.normal() ** 2;
        rows.push({
          ...{
            task: `task-${task}`,
            curtain: 'open',
            method: `method-${method}`,
            settings: '00000000',
            seed,
          },
          ...{ status: 'done', reason: '', best, median: best - 0.2, bestVisible, lift: best - bestVisible },
          ...{ optimism: 0.1 * stream.normal(), visible: 100, batch: 16, distinct: 16 },
          ...{ floor: 0, top: 1, topKnown: 'exact' },
        });
      }
    }
  }
  return rows;
}

/**
 * Seconds for a whole comparison of 100,000 rows; where Python has scipy, also those of two of its parts done by scipy:
 * a BCa bootstrap of each method's mean, and a paired permutation test of each method on each task.
 */
export async function benchCompare(): Promise<void> {
  const rows = makeRows();
  const milliseconds = await medianMilliseconds(3, () => compareRows(rows, { version: 'bench' }));
  report(`compare ${rows.length.toLocaleString('en-US')} ledger rows`, milliseconds / 1000, 's', 1);
  const seconds = timeScipy();
  if (seconds === undefined) {
    process.stdout.write('  scipy is not installed here: no ratio\n');
    return;
  }
  report('  scipy: bootstrap and permutation tests alone', seconds, 's', (1000 * seconds) / milliseconds);
}

function timeScipy(): number | undefined {
  const script = fileURLToPath(new URL('../../../tests/bench/compare_scipy.py', import.meta.url));
  try {
    const words = [script, tasks, methods, seeds].map(String);
    return Number(execFileSync('python3', words, { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] }));
  } catch {
    return undefined;
  }
}
