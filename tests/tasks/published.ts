import { readFileSync } from 'node:fs';
import { matrixFromRows } from '../../harness/designs.js';
import type { Task } from '../../harness/task.js';

/** An entry of tests/reference/test-functions.json; its `source` field says where each value comes from. */
export interface PublishedFunction {
  readonly id: string;
  readonly source: string;
  readonly check_points: readonly { readonly x: readonly number[]; readonly f: number }[];
}

const file = new URL('../reference/test-functions.json', import.meta.url);
const { functions } = JSON.parse(readFileSync(file, 'utf8')) as { functions: PublishedFunction[] };

/** The reference entry of one function. */
export function publishedFunction<Entry extends PublishedFunction>(id: string): Entry {
  const entry = functions.find((candidate) => candidate.id === id);
  if (entry === undefined) throw new Error(`test-functions.json has no function "${id}"`);
  return entry as Entry;
}

/** The true score of one design. */
export function scoreOf(task: Task, design: ArrayLike<number>): number {
  return task.truth(matrixFromRows([design]))[0]!;
}

/** How far two values are apart, as a share of the expected one; absolute where that is below 0.01. */
export function gap(actual: number, expected: number): number {
  return Math.abs(actual - expected) / Math.max(0.01, Math.abs(expected));
}
