import type { Catalogue } from './catalogue.js';
import { type Cell, cellsOf } from './cells.js';
import type { Crew, CrewResult } from './crew.js';
import { judge, judgeFailure, type Verdict } from './judge.js';
import type { Plan } from './plan/plan.js';
import { cellId } from './row.js';
import { methodStream, type Stage, setStage } from './stage.js';

/** A finished cell. */
export interface FinishedCell {
  readonly cell: Cell;
  readonly stage: Stage;
  readonly verdict: Verdict;
  /** Seconds the method took. */
  readonly seconds: number;
}

export interface RehearsalOptions {
  readonly plan: Plan;
  readonly catalogue: Pick<Catalogue, 'tasks'>;
  readonly crew: Crew;
  /** Identities of cells that are finished already. */
  readonly finished: ReadonlySet<string>;
  /** Called once for each finished cell, one call at a time; the rehearsal waits for it. */
  readonly onFinished: (cell: FinishedCell) => Promise<void>;
  /** Ends the rehearsal early; cells under way are dropped. */
  readonly signal: AbortSignal;
}

/**
 * Runs the cells of a plan that are not finished yet. Methods run in the crew and see only their offer; instances,
 * curtains and true scores stay on this side.
 *
 * Rejects with the first error of `onFinished` or of setting a stage.
 */
export async function runRehearsal(options: RehearsalOptions): Promise<void> {
  const { plan, crew, finished, onFinished, signal } = options;
  const cells = cellsOf(plan);
  const stageOf = stageKeeper(options, crew.workers + 1);
  let lastRecord = Promise.resolve();
  let stopped = false;
  const work = async () => {
    for (const cell of cells) {
      if (signal.aborted || stopped) return;
      if (finished.has(cellId(cell.key))) continue;
      const stage = stageOf(cell);
      const result = await crew.run(jobFor(plan, cell, stage));
      if (signal.aborted || stopped) return;
      const verdict = verdictOn(cell, stage, result, plan.batch);
      lastRecord = lastRecord.then(() => onFinished({ cell, stage, verdict, seconds: result.seconds }));
      await lastRecord;
    }
  };
  const workers = Array.from({ length: crew.workers }, () =>
    work().catch((error: unknown) => {
      stopped = true;
      throw error;
    }),
  );
  try {
    await Promise.all(workers);
  } finally {
    await lastRecord.catch(() => undefined);
  }
}

function jobFor(plan: Plan, cell: Cell, stage: Stage) {
  return {
    method: cell.method.method,
    settings: cell.method.settings,
    backend: plan.backend,
    offer: {
      space: stage.space,
      designs: stage.designs,
      scores: stage.scores,
      batchSize: plan.batch,
      budgetSeconds: plan.budgetSeconds,
      streamPath: methodStream(plan, cell).path,
    },
  };
}

function verdictOn(cell: Cell, stage: Stage, result: CrewResult, batchSize: number): Verdict {
  return result.kind === 'proposed'
    ? judge(cell, stage, result.proposal, batchSize)
    : judgeFailure(cell, stage, result.reason, batchSize);
}

/** Sets each stage once for the cells that share it, and keeps the last few. */
function stageKeeper({ plan, catalogue }: RehearsalOptions, most: number): (cell: Cell) => Stage {
  const kept = new Map<string, Stage>();
  return (cell) => {
    const { task, curtain, seed } = cell.key;
    const id = JSON.stringify([task, curtain, seed]);
    const known = kept.get(id);
    if (known !== undefined) return known;
    const stage = setStage(plan, cell, catalogue);
    kept.set(id, stage);
    if (kept.size > most) kept.delete(kept.keys().next().value!);
    return stage;
  };
}
