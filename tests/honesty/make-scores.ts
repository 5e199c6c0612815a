import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { catalogue } from '../../cli/catalogue.js';
import { packageRoot } from '../../cli/package-root.js';
import { openCrew } from '../../harness/crew.js';
import type { Plan } from '../../harness/plan/plan.js';
import { readPlan } from '../../harness/plan/read.js';
import { runRehearsal } from '../../harness/rehearsal.js';
import { type CellRow, cellId } from '../../harness/row.js';
import { Ledger } from '../../results/ledger.js';
import { renderScores, scoresFile } from './score-table.js';

/** Streams that the methods below are given; all others get two. */
const manyStreams = 10;

/** Quick methods that draw random numbers: they stand for a method and nine copies of itself. */
const copied = ['jitter', 'ridge-genetic'];

const folder = join(packageRoot, 'out', 'honesty');

/**
 * Rehearses `scores.plan.yaml` with other random numbers for the methods again and again, and writes the scores into
 * `scores.csv`. It can be stopped: the same command goes on.
 */
async function makeScores(): Promise<void> {
  const file = join(packageRoot, 'tests', 'honesty', 'scores.plan.yaml');
  const plan = readPlan(await readFile(file, 'utf8'), file, catalogue);
  const streams: CellRow[][] = [];
  for (let stream = 1; stream <= manyStreams; stream++) {
    const methods = plan.methods.filter(({ label }) => stream <= 2 || copied.includes(label));
    streams.push(await rehearse({ ...plan, methodSeed: stream, methods }, join(folder, `stream-${stream}`)));
    process.stdout.write(`stream ${stream} of ${manyStreams} is done\n`);
  }
  await writeFile(scoresFile, renderScores(streams));
}

async function rehearse(plan: Plan, out: string): Promise<CellRow[]> {
  await mkdir(out, { recursive: true });
  const ledger = await Ledger.open(out);
  const crew = openCrew(new URL('../../cli/worker.js', import.meta.url), availableParallelism());
  try {
    await runRehearsal({
      plan,
      catalogue,
      crew,
      finished: new Set(ledger.rows.map(cellId)),
      signal: new AbortController().signal,
      onFinished: ({ verdict, seconds }) => ledger.append(verdict.row, seconds),
    });
    return [...ledger.rows];
  } finally {
    await crew.close();
    await ledger.close();
  }
}

await makeScores();
