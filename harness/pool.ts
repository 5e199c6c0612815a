import type { FamilySpec } from './curtains/curtain-spec.js';
import { growFamily } from './curtains/family.js';
import type { Designs } from './designs.js';
import { OnebatchError } from './errors.js';
import type { Stream } from './random.js';
import { sampleUniform } from './space.js';
import type { Task } from './task.js';

/** The designs a rehearsal starts from, with everything that is known of them. A method never sees it. */
export interface Pool {
  /** The designs, (n, d). */
  readonly designs: Designs;
  /** Their true scores, (n); larger is better. */
  readonly scores: Float64Array;
  /** The smallest true score: 0 on the normalized scale. */
  readonly floor: number;
  /** Standard deviation of the true scores (divisor n − 1), the unit of noise. */
  readonly deviation: number;
  /** The rows from which variants were made; empty when the pool holds no family. */
  readonly parents: readonly number[];
}

/**
 * Draws `rows` designs uniformly from the task's space and scores them without noise. With a `family`, the later half
 * (rounded down) then gives way to variants of parents from the first half; scores, floor and deviation are those of
 * the pool that comes out.
 *
 * The uniform rows come from `stream.split('pool')` and the variants from `stream.split('family')`, so the first half
 * is the same with and without a family.
 *
 * @throws OnebatchError (`bad-settings`) when there are fewer than 2 rows, or fewer rows in the first half than
 * parents; (`numeric`) when a true score is not a finite number.
 */
export function drawPool(task: Task, rows: number, stream: Stream, family?: FamilySpec): Pool {
  if (!(Number.isInteger(rows) && rows >= 2)) {
    throw new OnebatchError('bad-settings', `a pool needs a whole number of at least 2 rows, got ${rows}`);
  }
  const uniform = sampleUniform(task.space, rows, stream.split('pool'));
  const { designs, parents } =
    family === undefined
      ? { designs: uniform, parents: [] }
      : growFamily(task.space, uniform, family, stream.split('family'));
  const scores = task.truth(designs);
  const bad = scores.findIndex((score) => !Number.isFinite(score));
  if (bad >= 0) {
    throw new OnebatchError(
      'numeric',
      `the task scores pool row ${bad} as ${scores[bad]}; expected a finite number`,
    );
  }
  const floor = scores.reduce((a, b) => Math.min(a, b));
  return { designs, scores, floor, deviation: deviationOf(scores), parents };
}

function deviationOf(scores: Float64Array): number {
  const mean = scores.reduce((sum, y) => sum + y, 0) / scores.length;
  const squares = scores.reduce((sum, y) => sum + (y - mean) ** 2, 0);
  return Math.sqrt(squares / (scores.length - 1));
}
