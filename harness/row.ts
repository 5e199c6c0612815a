import type { OptimumKnowledge } from './task.js';

/** What identifies a cell. */
export interface CellKey {
  /** The task's label in the plan. */
  readonly task: string;
  /** The curtain's label, such as `ceiling=0.5 thin=200`. */
  readonly curtain: string;
  /** The method's label in the plan. */
  readonly method: string;
  /** Eight hexadecimal digits of the hash of the method's settings, defaults filled in. */
  readonly settings: string;
  readonly seed: number;
}

/**
 * What a finished cell came to. All scores are true scores, normalized: (y − floor) / (top − floor), 0 the worst of
 * the pool, 1 the top; never clipped.
 */
export interface CellRow extends CellKey {
  /** A failed cell scores as if it had proposed the worst visible design throughout. */
  readonly status: 'done' | 'failed';
  /** Why the cell failed; empty where it did not. */
  readonly reason: string;
  /** Largest true score of the batch: its 100th percentile. */
  readonly best: number;
  /** Median true score of the batch: its 50th percentile (type 7). */
  readonly median: number;
  /** True score of the best visible design. */
  readonly bestVisible: number;
  /** best − bestVisible. */
  readonly lift: number;
  /** Mean of believed − true over the batch; absent where the method said no belief. */
  readonly optimism: number | undefined;
  /** Visible rows. */
  readonly visible: number;
  /** Designs in the batch. */
  readonly batch: number;
  /** Different designs in the batch; 0 for a failed cell. */
  readonly distinct: number;
  /** What 0 stands for, in the task's own scores. */
  readonly floor: number;
  /** What 1 stands for, in the task's own scores. */
  readonly top: number;
  /** How the top is known. */
  readonly topKnown: OptimumKnowledge;
}

/** One text for a cell's identity. */
export function cellId({ task, curtain, method, settings, seed }: CellKey): string {
  return JSON.stringify([task, curtain, method, settings, seed]);
}
