import { mkdir } from 'node:fs/promises';
import { join } from 'node:path';
import { type Cell, cellsOf, countCells } from '../harness/cells.js';
import { openCrew } from '../harness/crew.js';
import type { Plan } from '../harness/plan/plan.js';
import { runRehearsal } from '../harness/rehearsal.js';
import { cellId } from '../harness/row.js';
import { setStage } from '../harness/stage.js';
import { type BackendName, useBackend } from '../methods/surrogates/network/backend.js';
import { describeBackend } from '../methods/surrogates/network/backend-description.js';
import type { Comparison } from '../results/comparison.js';
import { countVerdicts } from '../results/count-verdicts.js';
import { keepsakeFolder, writeKeepsakes } from '../results/keepsakes.js';
import { Ledger } from '../results/ledger.js';
import type { Provenance } from '../results/manifest.js';
import { renderTerminal } from '../results/tables/terminal.js';
import { catalogue } from './catalogue.js';
import { claimFolder } from './claim-folder.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { version } from './package-root.js';
import { describeSeconds, startProgress } from './progress.js';
import { type RehearseArguments, readRehearsal } from './rehearse-options.js';
import { inStyle, remark, say } from './terminal.js';
import { writeComparison } from './write-comparison.js';

const workerFile = new URL('./worker.js', import.meta.url);

/** Runs a plan, or goes on with it, and ends with its comparison. */
export async function rehearse(given: RehearseArguments): Promise<ExitCode> {
  const { plan, out, workers, sameCells } = await readRehearsal(given, catalogue);
  await useBackend(plan.backend as BackendName);
  tryStages(plan);
  await claimFolder(out, provenanceOf(plan));
  if (plan.keep.length > 0) await mkdir(join(out, keepsakeFolder), { recursive: true });
  const ledger = await Ledger.open(out);
  const interruption = listenForInterruption();
  try {
    const comparison = await runRounds(plan, {
      out,
      ledger,
      workers,
      sameCells,
      signal: interruption.signal,
    });
    if (comparison === undefined) return exitCodes.interrupted;
    say(renderTerminal(comparison, { style: inStyle() }));
    return ledger.rows.some((row) => row.status === 'failed') ? exitCodes.cellsFailed : exitCodes.done;
  } finally {
    interruption.stop();
    await ledger.close();
  }
}

/** What the rounds of a rehearsal share. */
interface Course {
  readonly out: string;
  readonly ledger: Ledger;
  readonly workers: number;
  readonly sameCells: boolean;
  /** Aborted when a person interrupts. */
  readonly signal: AbortSignal;
}

function provenanceOf(plan: Plan): Provenance {
  const backend = describeBackend(plan.backend as BackendName);
  return { plan, program: version, node: process.version, backend };
}

/** Sets the first stage of every task and curtain, so that settings that can't work are told before anything runs. */
function tryStages(plan: Plan): void {
  const tried = new Set<string>();
  for (const cell of cellsOf({ ...plan, seeds: 1 })) {
    const stage = JSON.stringify([cell.key.task, cell.key.curtain]);
    if (tried.has(stage)) continue;
    tried.add(stage);
    setStage(plan, cell, catalogue);
  }
}

/** Runs the plan's seeds, or rounds of them until every verdict is reached; nothing when a person interrupted it. */
async function runRounds(plan: Plan, course: Course): Promise<Comparison | undefined> {
  const { out, ledger, sameCells, signal } = course;
  const order = ledgerOrder(plan);
  const { looks = [plan.seeds] } = plan;
  let comparison: Comparison | undefined;
  for (const [round, seeds] of looks.entries()) {
    await runCells({ ...plan, seeds }, course);
    if (signal.aborted) return undefined;
    await ledger.sort(order);
    comparison = await writeComparison(out, { plan, sameCells }, ledger);
    if (plan.looks === undefined) break;
    const { reached, all } = countVerdicts(comparison);
    remark(`Look ${round + 1} of ${looks.length}, at ${seeds} seeds: ${reached} of ${all} verdicts reached.`);
    if (reached === all) break;
  }
  return comparison;
}

/** Runs what is missing, until a person interrupts. */
async function runCells(plan: Plan, { out, ledger, workers, signal }: Course): Promise<void> {
  const finished = new Set(ledger.rows.filter(({ seed }) => seed <= plan.seeds).map(cellId));
  const total = countCells(plan);
  if (finished.size === total) {
    if (plan.looks === undefined) remark(`All ${total} cells are in ${out} already.`);
    return;
  }
  const before = finished.size === 0 ? '' : `, ${finished.size} of them done before`;
  const crewSize = Math.min(workers, total - finished.size);
  remark(
    `Rehearsing "${plan.name}": ${total} cells${before}, on ${crewSize} worker${crewSize === 1 ? '' : 's'}, into ${out}`,
  );
  const crew = openCrew(workerFile, crewSize);
  const dismiss = () => void crew.close();
  signal.addEventListener('abort', dismiss);
  const progress = startProgress(total, finished.size);
  const start = performance.now();
  try {
    await runRehearsal({
      plan,
      catalogue,
      crew,
      finished,
      signal,
      onFinished: async ({ stage, verdict, seconds }) => {
        await writeKeepsakes(out, plan.keep, stage.space, verdict);
        await ledger.append(verdict.row, seconds);
        progress.advance(verdict.row.status === 'failed');
      },
    });
  } finally {
    progress.stop();
    signal.removeEventListener('abort', dismiss);
    await crew.close();
  }
  remark(
    signal.aborted
      ? `Interrupted: ${ledger.rows.length} of ${total} cells are in ${out}; the same command goes on from there.`
      : `Done in ${describeSeconds((performance.now() - start) / 1000)}.`,
  );
}

/** Tasks, curtains and methods in the plan's order, then seeds. */
function ledgerOrder(plan: Plan): string[] {
  const place = ({ task, curtain, method }: Cell) => [
    plan.tasks.indexOf(task),
    task.curtains.indexOf(curtain),
    plan.methods.indexOf(method),
  ];
  const cells = [...cellsOf(plan)].map((cell) => ({ id: cellId(cell.key), at: [...place(cell), cell.seed] }));
  cells.sort((a, b) => a.at.map((k, i) => k - b.at[i]!).find((difference) => difference !== 0) ?? 0);
  return cells.map(({ id }) => id);
}

/** Turns Ctrl-C, a hang-up or a request to end into an abort signal. */
function listenForInterruption(): { signal: AbortSignal; stop: () => void } {
  const controller = new AbortController();
  const interrupt = () => controller.abort();
  const signals = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const;
  for (const signal of signals) process.on(signal, interrupt);
  return {
    signal: controller.signal,
    stop: () => {
      for (const signal of signals) process.off(signal, interrupt);
    },
  };
}
