import type { CellRow } from '../../../harness/row.js';
import { compareRows } from '../../../results/comparison.js';
import { makeRow, makeSeconds } from '../made-ledger.js';

const bests = { careful: [0.7, 0.8, 0.9], naive: [0.4, 0.5, 0.3] };

/** Two tasks, two methods, three seeds, with one failure. */
export const smallLedger: readonly CellRow[] = [
  ...['hartmann-6', 'nk(20, 3)'].flatMap((task, t) =>
    (['careful', 'naive'] as const).flatMap((method) =>
      bests[method].map((best, seed) =>
        makeRow({
          task,
          method,
          seed,
          best: best + t / 10,
          median: best - 0.2,
          bestVisible: 0.6 + seed / 100,
          topKnown: t === 0 ? 'published' : 'best-known',
          ...(method === 'naive' ? { optimism: 0.5 + seed / 10 } : {}),
        }),
      ),
    ),
  ),
].map((row) =>
  row.task === 'hartmann-6' && row.method === 'naive' && row.seed === 2
    ? { ...row, status: 'failed', reason: 'out of time after 20 s', optimism: undefined, distinct: 0 }
    : row,
);

/** The comparison of the small ledger. */
export const smallComparison = compareRows(smallLedger, {
  version: '0.1.0',
  seconds: makeSeconds(smallLedger),
  resamples: 2000,
});
