import { hashOf } from './canonical.js';
import { type CurtainSpec, curtainLabel } from './curtain.js';
import type { Plan, PlannedMethod, PlannedTask } from './plan/plan.js';
import type { CellKey } from './row.js';

/** One cell of a plan: what to run, and what identifies it. */
export interface Cell {
  readonly key: CellKey;
  readonly task: PlannedTask;
  readonly curtain: CurtainSpec;
  readonly method: PlannedMethod;
  readonly seed: number;
}

/** All cells of a plan; those that share a task, curtain and seed follow one another, so that they can share a stage. */
export function* cellsOf(plan: Plan): Generator<Cell> {
  const methods = plan.methods.map((method) => ({ method, settings: settingsHash(method) }));
  for (const task of plan.tasks) {
    for (const curtain of task.curtains) {
      const label = curtainLabel(curtain);
      for (let seed = 1; seed <= plan.seeds; seed++) {
        for (const { method, settings } of methods) {
          const key = { task: task.label, curtain: label, method: method.label, settings, seed };
          yield { key, task, curtain, method, seed };
        }
      }
    }
  }
}

/** How many cells a plan has. */
export function countCells(plan: Plan): number {
  const stages = plan.tasks.reduce((sum, task) => sum + task.curtains.length, 0);
  return stages * plan.seeds * plan.methods.length;
}

/** Eight hexadecimal digits that stand for a method and all its settings. */
export function settingsHash({ method, settings }: PlannedMethod): string {
  return hashOf({ method, settings }).slice(0, 8);
}
