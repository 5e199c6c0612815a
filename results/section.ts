import type { Stream } from '../harness/random.js';
import { type CellRow, cellId } from '../harness/row.js';
import type { OptimumKnowledge } from '../harness/task.js';
import { type Estimate, estimateMean, estimateShare, type ShareEstimate } from './estimate.js';
import { type Against, holdAgainst, type ReferenceBlock } from './reference.js';
import type { MethodCells, SectionCells } from './scores.js';
import type { TaskMeans } from './task-means.js';

/** One method on one task behind one curtain. */
export interface MethodScores {
  readonly method: string;
  /** Hash of its settings. */
  readonly settings: string;
  /** Finished cells, failed ones included. */
  readonly cells: number;
  readonly failures: number;
  readonly best: Estimate;
  readonly median: Estimate;
  readonly lift: Estimate;
  /** Over the cells that stated a belief, which `n` counts; null where none did. */
  readonly optimism: Estimate | null;
  /** Share of cells whose batch held a better design than the best visible one. */
  readonly beatVisible: ShareEstimate;
  /** Mean of the different designs in a batch, over the cells that did not fail; null where all failed. */
  readonly distinct: number | null;
  /** Mean over the cells whose time is known; null where none is. */
  readonly seconds: number | null;
}

/** Smallest and largest of a count. */
export interface CountRange {
  readonly least: number;
  readonly most: number;
}

/** One task behind one curtain. */
export interface Section {
  readonly task: string;
  readonly curtain: string;
  /** Different seeds in the ledger; a method with fewer cells has not finished all of them. */
  readonly seeds: number;
  /** How the score that 1 stands for is known; more than one where it differs by seed. */
  readonly top: readonly OptimumKnowledge[];
  readonly batch: CountRange;
  readonly visible: CountRange;
  /** The line to beat, which is no method: the score of the best design that was visible. */
  readonly bestVisible: Estimate;
  /** From the highest mean best to the lowest. */
  readonly methods: readonly MethodScores[];
  /** Every other method against the reference; null where that has no cell here, or is the only method. */
  readonly reference: ReferenceBlock | null;
}

/** The scores that have an estimate. */
export type ScoreName = 'best' | 'median' | 'lift' | 'optimism';

/** What is needed beside the cells. */
export interface ScoringOptions {
  readonly seconds: ReadonlyMap<string, number>;
  readonly resamples: number;
  readonly stream: Stream;
  /** The method that the others are held against, and how. */
  readonly against: Against;
  /** Where a method's score is collected over all tasks; the line to beat has no method. */
  readonly total?: (method: string | null, score: ScoreName) => TaskMeans;
}

/** Means and intervals of one task behind one curtain. */
export function scoreSection(cells: SectionCells, options: ScoringOptions): Section {
  const stream = options.stream.split(cells.task, cells.curtain);
  const rows = cells.methods.flatMap((method) => method.rows);
  return {
    task: cells.task,
    curtain: cells.curtain,
    seeds: cells.seeds.length,
    top: (['published', 'exact', 'best-known'] as const).filter((known) =>
      rows.some((row) => row.topKnown === known),
    ),
    batch: range(rows.map((row) => row.batch)),
    visible: range(rows.map((row) => row.visible)),
    bestVisible: estimateMean(cells.bestVisible, options.total?.(null, 'best')),
    methods: cells.methods
      .map((method) => scoreMethod(method, options))
      .sort((a, b) => b.best.value - a.best.value),
    reference: holdAgainst([cells], options.against, stream),
  };
}

/** The optimism of the cells that stated a belief. */
export function beliefs(rows: readonly CellRow[]): number[] {
  return rows.flatMap(({ optimism }) => (optimism === undefined ? [] : [optimism]));
}

/** Cells that failed. */
export function countFailures(rows: readonly CellRow[]): number {
  return rows.filter((row) => row.status === 'failed').length;
}

/** Mean seconds of the cells whose time is known; null where none is. */
export function meanSeconds(rows: readonly CellRow[], seconds: ReadonlyMap<string, number>): number | null {
  return meanOrNull(rows.flatMap((row) => seconds.get(cellId(row)) ?? []));
}

/** Mean; null of nothing. */
export function meanOrNull(values: readonly number[]): number | null {
  return values.length === 0 ? null : values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Mean number of different designs in the batches of cells that did not fail; null where all failed. */
export function meanDistinct(rows: readonly CellRow[]): number | null {
  return meanOrNull(rows.filter((row) => row.status === 'done').map((row) => row.distinct));
}

function scoreMethod({ method, settings, rows }: MethodCells, options: ScoringOptions): MethodScores {
  const mean = (name: ScoreName, values: readonly number[]): Estimate =>
    estimateMean(values, options.total?.(method, name));
  const believed = beliefs(rows);
  return {
    method,
    settings,
    cells: rows.length,
    failures: countFailures(rows),
    best: mean(
      'best',
      rows.map((row) => row.best),
    ),
    median: mean(
      'median',
      rows.map((row) => row.median),
    ),
    lift: mean(
      'lift',
      rows.map((row) => row.lift),
    ),
    optimism: believed.length === 0 ? null : mean('optimism', believed),
    beatVisible: shareBeatingVisible(rows),
    distinct: meanDistinct(rows),
    seconds: meanSeconds(rows, options.seconds),
  };
}

/** Share of cells whose batch held a better design than the best visible one, with Wilson's interval. */
export function shareBeatingVisible(rows: readonly CellRow[]): ShareEstimate {
  return estimateShare(rows, (row) => row.best > row.bestVisible);
}

function range(counts: readonly number[]): CountRange {
  return {
    least: counts.reduce((least, count) => Math.min(least, count), Number.POSITIVE_INFINITY),
    most: counts.reduce((most, count) => Math.max(most, count), Number.NEGATIVE_INFINITY),
  };
}
