import { curtainLabel } from './curtains/curtain-label.js';
import { type CurtainSpec, curtainSchema } from './curtains/curtain-spec.js';
import { isNearParent } from './curtains/family.js';
import { drawRegion, isInside } from './curtains/region.js';
import { type Designs, rowView, takeRows } from './designs.js';
import { OnebatchError } from './errors.js';
import { drawPool, type Pool } from './pool.js';
import { quantile } from './quantile.js';
import { type Stream, shuffleInPlace } from './random.js';
import type { Task } from './task.js';

export { type CurtainSpec, curtainLabel, curtainSchema };

/** A pool behind a curtain: what a method may see of it (`designs`, `scores`), and what only the scorer may. */
export interface CurtainedPool {
  readonly pool: Pool;
  /** The visible pool rows, (n), in the pool's order. */
  readonly visible: readonly number[];
  /** The visible designs, (n, d). */
  readonly designs: Designs;
  /** Their measured scores, (n): the true ones plus noise. */
  readonly scores: Float64Array;
  /** Their true scores, (n). */
  readonly trueScores: Float64Array;
}

/**
 * Draws a pool of `poolRows` designs and says what of it is visible, and as what it was measured.
 *
 * Every part draws from a child of `stream` of its own (`pool`, `family`, `region`, `thin`, `noise`), so that adding
 * or changing one part never changes the draws of another: a pool row has the same noise whatever else is hidden, and
 * of two curtains that thin, the row that one keeps the other keeps before any row that the first passed over.
 *
 * @throws OnebatchError (`bad-settings`) when the spec doesn't fit the task, or leaves fewer than 2 rows visible;
 * whatever `drawPool` throws.
 */
export function drawCurtain(task: Task, spec: CurtainSpec, poolRows: number, stream: Stream): CurtainedPool {
  const pool = drawPool(task, poolRows, stream, spec.family);
  const visible = thinned(visibleRows(task, spec, pool, stream), spec.thin, pool, stream.split('thin'));
  if (visible.length < 2) {
    throw new OnebatchError(
      'bad-settings',
      `the curtain ${curtainLabel(spec)} leaves ${visible.length} of ${poolRows} pool rows visible, and a method needs at least 2; draw a larger pool or hide less`,
    );
  }
  const measured = measure(pool, spec.noise ?? 0, stream.split('noise'));
  return {
    pool,
    visible,
    designs: takeRows(pool.designs, visible),
    scores: Float64Array.from(visible, (i) => measured[i]!),
    trueScores: Float64Array.from(visible, (i) => pool.scores[i]!),
  };
}

function visibleRows(task: Task, spec: CurtainSpec, pool: Pool, stream: Stream): number[] {
  const { ceiling, region, family } = spec;
  const limit = ceiling === undefined ? Number.POSITIVE_INFINITY : quantile(pool.scores, ceiling);
  const box = region === undefined ? undefined : drawRegion(task, region, stream.split('region'));
  const rows: number[] = [];
  for (let i = 0; i < pool.designs.rows; i++) {
    if (pool.scores[i]! >= limit) continue;
    if (box !== undefined && isInside(box, rowView(pool.designs, i))) continue;
    if (family !== undefined && !isNearParent(pool.designs, i, pool.parents, family.changes)) continue;
    rows.push(i);
  }
  return rows;
}

/** The `count` rows that come first in one random order of the whole pool; all rows without a count. */
function thinned(rows: number[], count: number | undefined, pool: Pool, stream: Stream): number[] {
  if (count === undefined || count >= rows.length) return rows;
  const order = shuffleInPlace(
    Uint32Array.from({ length: pool.designs.rows }, (_, i) => i),
    stream,
  );
  const left = new Set(rows);
  const kept: number[] = [];
  for (const i of order) {
    if (left.has(i) && kept.length < count) kept.push(i);
  }
  return kept.sort((a, b) => a - b);
}

/** The score of every pool row as measured; one normal number is drawn per row, in the pool's order. */
function measure(pool: Pool, noise: number, stream: Stream): Float64Array {
  return pool.scores.map((score) => score + noise * pool.deviation * stream.normal());
}
