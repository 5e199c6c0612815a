import { canonicalJson, hashOf } from './canonical.js';
import { type Catalogue, lookUpTask } from './catalogue.js';
import { type Cell, settingsHash } from './cells.js';
import { curtainLabel, drawCurtain } from './curtain.js';
import type { Designs } from './designs.js';
import { OnebatchError } from './errors.js';
import type { Plan } from './plan/plan.js';
import { openStream, rootStream, type Stream } from './random.js';
import type { Space } from './space.js';
import type { OptimumKnowledge } from './task.js';

/** Everything that the cells of one (task, curtain, seed) share; methods see `space`, `designs` and `scores` only. */
export interface Stage {
  readonly space: Space;
  /** Visible designs, (n, d). */
  readonly designs: Designs;
  /** Their measured, noisy scores, (n), in the task's own scores. */
  readonly scores: Float64Array;
  /** What 0 and 1 of normalized scores stand for. */
  readonly floor: number;
  readonly top: number;
  readonly topKnown: OptimumKnowledge;
  /** Normalized true score of the best and the worst visible design. */
  readonly bestVisible: number;
  readonly worstVisible: number;
  /** A score on the normalized scale; not clipped. */
  normalize(score: number): number;
  /** Normalized true scores of designs inside the space. */
  judge(designs: Designs): Float64Array;
}

/**
 * Makes the task instance, its pool and its curtain for a cell. They depend on the plan's seed, the task and its
 * settings, the curtain and the cell's seed, never on the method: comparisons are paired.
 *
 * @throws OnebatchError (`bad-settings`) when the task or the curtain can't be made so.
 */
export function setStage(plan: Plan, cell: Cell, catalogue: Pick<Catalogue, 'tasks'>): Stage {
  const { family, settings } = cell.task;
  const stream = rootStream(plan.seed).split('task', family, canonicalJson(settings), cell.seed);
  const task = lookUpTask(catalogue, family).make(settings, stream.split('instance'));
  const view = drawCurtain(task, cell.curtain, plan.pool, stream.split('pool'));
  const { floor } = view.pool;
  const { value, known } = task.optimum;
  const top = known === 'best-known' ? Math.max(value, largest(view.pool.scores)) : value;
  if (!(top > floor)) {
    throw new OnebatchError(
      'bad-settings',
      `task "${cell.task.label}": the whole pool scores ${floor}, nothing can be better`,
    );
  }
  const normalize = (score: number) => (score - floor) / (top - floor);
  const visibleTruth = view.trueScores.map(normalize);
  return {
    space: task.space,
    designs: view.designs,
    scores: view.scores,
    floor,
    top,
    topKnown: known,
    bestVisible: largest(visibleTruth),
    worstVisible: -largest(visibleTruth.map((score) => -score)),
    normalize,
    judge: (designs) => task.truth(designs).map(normalize),
  };
}

/**
 * The stream that a cell's method draws from. Its path is hashed, so that a method can't read the task from it. A method
 * seed that is the plan's seed changes nothing.
 */
export function methodStream(plan: Plan, cell: Cell): Stream {
  const { family, settings } = cell.task;
  const { method, seed } = cell;
  const { methodSeed = plan.seed } = plan;
  const keys = [
    plan.seed,
    'method',
    family,
    settings,
    curtainLabel(cell.curtain),
    settingsHash(method),
    seed,
    ...(methodSeed === plan.seed ? [] : [methodSeed]),
  ];
  return openStream(JSON.stringify([hashOf(keys)]));
}

function largest(values: Float64Array): number {
  return values.reduce((most, value) => Math.max(most, value), Number.NEGATIVE_INFINITY);
}
