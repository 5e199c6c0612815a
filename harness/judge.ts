import type { Cell } from './cells.js';
import { countDistinctRows } from './designs.js';
import type { Proposal } from './method.js';
import { quantile } from './quantile.js';
import type { CellRow } from './row.js';
import type { Stage } from './stage.js';
import { findFault } from './verify-proposal.js';

/** A step of a climb with belief beside truth, both normalized, one value a design. */
export interface JudgedStep {
  readonly step: number;
  readonly believed: Float64Array;
  readonly truth: Float64Array;
}

/** A cell's row, and what it rests on where the method did propose a batch. */
export interface Verdict {
  readonly row: CellRow;
  readonly batch?: {
    readonly proposal: Proposal;
    /** Normalized true scores, one a design. */
    readonly truth: Float64Array;
    /** Normalized beliefs and spreads, where the method said any. */
    readonly believed?: Float64Array;
    readonly spread?: Float64Array;
  };
  readonly trace?: readonly JudgedStep[];
}

/** Scores a proposal against the truth; one that breaks the contract becomes a failed cell with the reason. */
export function judge(cell: Cell, stage: Stage, proposal: unknown, batchSize: number): Verdict {
  const fault = findFault(proposal, stage.space, batchSize);
  if (fault !== undefined) return judgeFailure(cell, stage, fault, batchSize);
  const { designs, believed, spread, trace } = proposal as Proposal;
  const truth = stage.judge(designs);
  const beliefs = believed?.map(stage.normalize);
  const optimism = beliefs === undefined ? undefined : meanOf(beliefs.map((belief, i) => belief - truth[i]!));
  if (optimism !== undefined && !Number.isFinite(optimism)) {
    return judgeFailure(cell, stage, 'believed scores too large to be averaged', batchSize);
  }
  const best = quantile(truth, 1);
  return {
    row: {
      ...cell.key,
      status: 'done',
      reason: '',
      best,
      median: quantile(truth, 0.5),
      bestVisible: stage.bestVisible,
      lift: best - stage.bestVisible,
      optimism,
      visible: stage.designs.rows,
      batch: batchSize,
      distinct: countDistinctRows(designs),
      floor: stage.floor,
      top: stage.top,
      topKnown: stage.topKnown,
    },
    batch: {
      proposal: proposal as Proposal,
      truth,
      ...(beliefs === undefined ? {} : { believed: beliefs }),
      ...(spread === undefined ? {} : { spread: spread.map((s) => s / (stage.top - stage.floor)) }),
    },
    ...(trace === undefined ? {} : { trace: trace.map((step) => judgeStep(step, stage)) }),
  };
}

/** The row of a failed cell: it scores as if it had proposed the worst visible design throughout. */
export function judgeFailure(cell: Cell, stage: Stage, reason: string, batchSize: number): Verdict {
  return {
    row: {
      ...cell.key,
      status: 'failed',
      reason,
      best: stage.worstVisible,
      median: stage.worstVisible,
      bestVisible: stage.bestVisible,
      lift: stage.worstVisible - stage.bestVisible,
      optimism: undefined,
      visible: stage.designs.rows,
      batch: batchSize,
      distinct: 0,
      floor: stage.floor,
      top: stage.top,
      topKnown: stage.topKnown,
    },
  };
}

function judgeStep(
  { step, believed, designs }: NonNullable<Proposal['trace']>[number],
  stage: Stage,
): JudgedStep {
  return { step, believed: believed.map(stage.normalize), truth: stage.judge(designs) };
}

function meanOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
