import type { Stream } from '../harness/random.js';
import { type CellRow, cellId } from '../harness/row.js';
import type { OptimumKnowledge } from '../harness/task.js';
import { type Estimate, estimateMean } from './estimate.js';
import type { MethodCells, SectionCells } from './scores.js';

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
}

/** What is needed beside the cells. */
export interface ScoringOptions {
  readonly seconds: ReadonlyMap<string, number>;
  readonly resamples: number;
  readonly stream: Stream;
}

/**
 * Means and intervals of one task behind one curtain. All bootstraps of a section draw the same seeds, so that methods
 * with the same scores have the same intervals.
 */
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
    bestVisible: estimate(cells.bestVisible, { ...options, stream }),
    methods: cells.methods
      .map((method) => scoreMethod(method, { ...options, stream }))
      .sort((a, b) => b.best.value - a.best.value),
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
  const mean = (score: (row: CellRow) => number): Estimate => estimate(rows.map(score), options);
  const believed = beliefs(rows);
  return {
    method,
    settings,
    cells: rows.length,
    failures: countFailures(rows),
    best: mean((row) => row.best),
    median: mean((row) => row.median),
    lift: mean((row) => row.lift),
    optimism: believed.length === 0 ? null : estimate(believed, options),
    distinct: meanDistinct(rows),
    seconds: meanSeconds(rows, options.seconds),
  };
}

function estimate(values: readonly number[], { resamples, stream }: ScoringOptions): Estimate {
  return estimateMean(values, { resamples, stream: stream.split('seeds drawn') });
}

function range(counts: readonly number[]): CountRange {
  return {
    least: counts.reduce((least, count) => Math.min(least, count), Number.POSITIVE_INFINITY),
    most: counts.reduce((most, count) => Math.max(most, count), Number.NEGATIVE_INFINITY),
  };
}
