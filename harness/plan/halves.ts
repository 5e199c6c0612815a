import { OnebatchError } from '../errors.js';
import type { Plan } from './plan.js';

/** Whether a plan gives a setting of a method several values. */
export function hasSweeps({ methods }: Pick<Plan, 'methods'>): boolean {
  return methods.some(({ sweep }) => sweep !== undefined);
}

/**
 * Refuses a plan whose sweeps can't be chosen on one half and reported on the other.
 *
 * @throws OnebatchError (`bad-input`) saying what to add.
 */
export function checkHalves({ methods, tasks, seeds, choose }: Plan): void {
  const swept = methods.find(({ sweep }) => sweep !== undefined)?.sweep;
  if (swept === undefined) return;
  const on = choose?.on ?? 'seeds';
  const count = on === 'seeds' ? seeds : tasks.length;
  if (count >= 2) return;
  const mend = on === 'seeds' ? 'raise --seeds' : 'add a task, or choose on seeds';
  throw new OnebatchError(
    'bad-input',
    `the sweep of ${swept} is chosen on half of the ${on} and reported on the other half, which takes 2 ${on}, not ${count}; ${mend}, or say --same-cells`,
  );
}
