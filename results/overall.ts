import type { CellRow } from '../harness/row.js';
import { type Estimate, estimateOverTasks } from './estimate.js';
import type { MethodCells, SectionCells } from './scores.js';
import {
  beliefs,
  countFailures,
  meanDistinct,
  meanOrNull,
  meanSeconds,
  type ScoringOptions,
} from './section.js';
import type { Aggregate } from './statistics/aggregate.js';

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
}

/**
 * Aggregates over all tasks, with intervals over the seeds within each task. All bootstraps draw the same seeds, so
 * that methods with the same scores have the same intervals.
 */
export function scoreOverall(sections: readonly SectionCells[], options: ScoringOptions): Overall {
  const ours = { ...options, stream: options.stream.split('all tasks') };
  const methods = [...new Set(sections.flatMap((section) => section.methods.map(({ method }) => method)))];
  return {
    sections: sections.length,
    bestVisible: aggregates(
      sections.map((section) => section.bestVisible),
      ours,
    ),
    methods: methods
      .map((method) =>
        scoreMethod(
          sections.flatMap((section) => section.methods.filter((it) => it.method === method)),
          ours,
        ),
      )
      .sort((a, b) => b.best.mean.value - a.best.mean.value),
  };
}

function scoreMethod(tasks: readonly MethodCells[], options: ScoringOptions): OverallScores {
  const rows = tasks.flatMap((task) => task.rows);
  const each = (score: (row: CellRow) => number): number[][] => tasks.map((task) => task.rows.map(score));
  const believed = tasks.map((task) => beliefs(task.rows)).filter((cells) => cells.length > 0);
  return {
    method: tasks[0]!.method,
    settings: tasks[0]!.settings,
    sections: tasks.length,
    cells: rows.length,
    failures: countFailures(rows),
    best: aggregates(
      each((row) => row.best),
      options,
    ),
    median: aggregates(
      each((row) => row.median),
      options,
    ),
    lift: estimate(
      each((row) => row.lift),
      'mean-of-task-means',
      options,
    ),
    optimism: believed.length === 0 ? null : estimate(believed, 'mean-of-task-means', options),
    distinct: meanDistinct(rows),
    seconds: meanOrNull(tasks.flatMap((task) => meanSeconds(task.rows, options.seconds) ?? [])),
  };
}

function aggregates(tasks: readonly (readonly number[])[], options: ScoringOptions): Aggregates {
  return {
    mean: estimate(tasks, 'mean-of-task-means', options),
    interquartileMean: estimate(tasks, 'interquartile-mean', options),
  };
}

function estimate(
  tasks: readonly (readonly number[])[],
  aggregate: Aggregate,
  { resamples, stream }: ScoringOptions,
): Estimate {
  return estimateOverTasks(tasks, aggregate, { resamples, stream: stream.split('seeds drawn') });
}
