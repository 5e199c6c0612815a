import type { CellRow } from '../../harness/row.js';
import type { PairedScore } from '../paired.js';

/** The variant with the highest mean score. */
export interface ChosenVariant {
  readonly variant: string;
  /** Its mean over tasks of the mean score over seeds. */
  readonly score: number;
  /** Pairs of task and curtain that were averaged over. */
  readonly tasks: number;
  /** Cells of each variant that were averaged over: those that all variants have. */
  readonly cells: number;
  /** Cells (of a task, curtain and seed) left out, as not all variants have them. */
  readonly leftOut: number;
}

interface Place {
  readonly task: string;
  readonly scores: ReadonlyMap<string, number>;
}

/**
 * Chooses the variant with the highest mean over tasks (each behind each curtain) of the mean score over seeds, on the
 * cells that all variants have; the first of equals. A failed cell counts with its score, as everywhere.
 *
 * @param rows of the variants, in any order.
 * @returns `undefined` where the variants have no cell in common.
 */
export function chooseVariant(
  rows: readonly CellRow[],
  variants: readonly string[],
  score: PairedScore,
): ChosenVariant | undefined {
  const all = gather(rows, score);
  const common = all.filter(({ scores }) => variants.every((variant) => scores.has(variant)));
  if (common.length === 0) return undefined;
  const tasks = [...new Set(common.map(({ task }) => task))].map((name) => {
    return common.filter(({ task }) => task === name);
  });
  const means = variants.map((variant) =>
    mean(tasks.map((places) => mean(places.map(({ scores }) => scores.get(variant)!)))),
  );
  const highest = means.reduce((best, value, i) => (value > means[best]! ? i : best), 0);
  return {
    variant: variants[highest]!,
    score: means[highest]!,
    tasks: tasks.length,
    cells: common.length,
    leftOut: all.length - common.length,
  };
}

/** Scores by task, curtain and seed, in an order that the rows' order does not touch. */
function gather(rows: readonly CellRow[], score: PairedScore): Place[] {
  const places = new Map<string, { task: string; scores: Map<string, number> }>();
  for (const row of rows) {
    const task = JSON.stringify([row.task, row.curtain]);
    const key = JSON.stringify([row.task, row.curtain, row.seed]);
    const place = places.get(key) ?? { task, scores: new Map<string, number>() };
    places.set(key, place);
    place.scores.set(row.method, row[score]);
  }
  return [...places].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, place]) => place);
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
