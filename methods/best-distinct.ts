import { type Designs, orderByDescending, rowKey, takeRows } from '../harness/designs.js';
import type { Table } from './parts.js';

/** Different designs and the score of each, best first. */
export interface Ranking {
  /** (m, d) */
  readonly designs: Designs;
  /** (m), from the highest to the lowest. */
  readonly scores: Float64Array;
}

/**
 * The visible designs, each once, from the best to the worst: at most `count` of them, fewer when the table holds
 * fewer different ones. A design measured several times counts with the mean of its scores; equal scores keep the
 * table's order.
 */
export function bestDistinct(table: Pick<Table, 'designs' | 'scores'>, count: number): Ranking {
  const rowsOf = new Map<string, number[]>();
  for (let i = 0; i < table.designs.rows; i++) {
    const key = rowKey(table.designs, i);
    const rows = rowsOf.get(key);
    if (rows === undefined) rowsOf.set(key, [i]);
    else rows.push(i);
  }
  const groups = [...rowsOf.values()];
  const means = groups.map((rows) => rows.reduce((sum, i) => sum + table.scores[i]!, 0) / rows.length);
  const best = orderByDescending(means).slice(0, count);
  return {
    designs: takeRows(
      table.designs,
      best.map((group) => groups[group]![0]!),
    ),
    scores: Float64Array.from(best, (group) => means[group]!),
  };
}
