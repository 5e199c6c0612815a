import { type Estimate, estimateInterquartileMeans, type ShareEstimate } from './estimate.js';
import { type Ranks, rankMethods } from './ranks.js';
import { holdAgainst, type ReferenceBlock } from './reference.js';
import type { MethodCells, SectionCells } from './scores.js';
import {
  beliefs,
  countFailures,
  meanDistinct,
  meanOrNull,
  meanSeconds,
  type ScoreName,
  type ScoringOptions,
  type Section,
  shareBeatingVisible,
} from './section.js';
import { TaskMeans } from './task-means.js';

/** A score over all tasks: as the mean of the tasks' means, and as the interquartile mean of all cells. */
export interface Aggregates {
  readonly mean: Estimate;
  readonly interquartileMean: Estimate;
}

/** One method over all tasks. */
export interface OverallScores {
  readonly method: string;
  readonly settings: string;
  /** Pairs of task and curtain that the method has cells on. */
  readonly sections: number;
  readonly cells: number;
  readonly failures: number;
  readonly best: Aggregates;
  readonly median: Aggregates;
  /** Mean of the tasks' means. */
  readonly lift: Estimate;
  /** Mean of the tasks' means, over tasks and cells where a belief was stated; null where none was. */
  readonly optimism: Estimate | null;
  /** Share of cells whose batch held a better design than the best visible one. */
  readonly beatVisible: ShareEstimate;
  readonly distinct: number | null;
  /** Mean of the tasks' means. */
  readonly seconds: number | null;
}

/** All tasks behind all curtains together, each pair of task and curtain counting as one task. */
export interface Overall {
  readonly sections: number;
  /** The line to beat, which is no method. */
  readonly bestVisible: Aggregates;
  /** From the highest mean best to the lowest. */
  readonly methods: readonly OverallScores[];
  /** Every other method against the reference; null where there is none to compare. */
  readonly reference: ReferenceBlock | null;
  /** Null where fewer than two methods have cells on all tasks. */
  readonly ranks: Ranks | null;
}

/** Resamples of interquartile means unless told otherwise. */
export const defaultResamples = 2000;

/** Collects scores task by task: see `ScoringOptions.total`. */
export class Totals {
  readonly #totals = new Map<string, TaskMeans>();

  readonly collect = (method: string | null, score: ScoreName): TaskMeans => {
    const key = JSON.stringify([method, score]);
    const total = this.#totals.get(key) ?? new TaskMeans();
    this.#totals.set(key, total);
    return total;
  };
}

/**
 * Aggregates over all tasks, with intervals over the seeds within each task. All bootstraps draw the same seeds, so
 * that methods with the same scores have the same intervals.
 *
 * @param scored the sections, whose scores `totals` collected.
 */
export function scoreOverall(
  sections: readonly SectionCells[],
  scored: readonly Section[],
  totals: Totals,
  options: ScoringOptions,
): Overall {
  const stream = options.stream.split('all tasks');
  const labels = [...new Set(sections.flatMap((section) => section.methods.map(({ method }) => method)))];
  const cells = labels.map((label) =>
    sections.flatMap((section) => section.methods.filter(({ method }) => method === label)),
  );
  const scores = (score: 'best' | 'median') =>
    cells.map((tasks) => tasks.map(({ rows }) => rows.map((row) => row[score])));
  const [bestVisible, ...interquartile] = estimateInterquartileMeans(
    [sections.map((section) => section.bestVisible), ...scores('best'), ...scores('median')],
    { resamples: options.resamples, stream },
  );
  const methods = cells.map((tasks, i) => ({
    ...describeMethod(tasks, options),
    best: {
      mean: totals.collect(labels[i]!, 'best').estimate(),
      interquartileMean: interquartile[i]!,
    },
    median: {
      mean: totals.collect(labels[i]!, 'median').estimate(),
      interquartileMean: interquartile[labels.length + i]!,
    },
    lift: totals.collect(labels[i]!, 'lift').estimate(),
    optimism: tasks.some(({ rows }) => beliefs(rows).length > 0)
      ? totals.collect(labels[i]!, 'optimism').estimate()
      : null,
  }));
  return {
    sections: sections.length,
    bestVisible: {
      mean: totals.collect(null, 'best').estimate(),
      interquartileMean: bestVisible!,
    },
    methods: methods.sort((a, b) => b.best.mean.value - a.best.mean.value),
    reference: holdAgainst(sections, options.against, stream),
    ranks: rankMethods(scored, options.against.score),
  };
}

function describeMethod(tasks: readonly MethodCells[], options: ScoringOptions) {
  const rows = tasks.flatMap((task) => task.rows);
  return {
    method: tasks[0]!.method,
    settings: tasks[0]!.settings,
    sections: tasks.length,
    cells: rows.length,
    failures: countFailures(rows),
    beatVisible: shareBeatingVisible(rows),
    distinct: meanDistinct(rows),
    seconds: meanOrNull(tasks.flatMap((task) => meanSeconds(task.rows, options.seconds) ?? [])),
  };
}
