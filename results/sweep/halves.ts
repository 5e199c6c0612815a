import type { Halved } from '../../harness/plan/plan.js';
import type { CellRow } from '../../harness/row.js';

/** Cells on which settings may be chosen, or that are reported. */
export type Half = (row: Pick<CellRow, 'task' | 'seed'>) => boolean;

/**
 * Whether settings are chosen on a cell; all others are reported. Even seeds choose, or the tasks at even places of
 * the plan, each with all its curtains and seeds: neither further seeds nor tasks added at the end move a cell to the
 * other half. A task that the plan does not name is reported.
 *
 * @param tasks labels in the plan's order.
 */
export function choosingHalf(on: Halved, tasks: readonly string[]): Half {
  if (on === 'seeds') return ({ seed }) => seed % 2 === 0;
  const choosing = new Set(tasks.filter((_, i) => i % 2 === 1));
  return ({ task }) => choosing.has(task);
}
