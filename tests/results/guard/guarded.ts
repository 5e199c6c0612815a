import type { Plan } from '../../../harness/plan/plan.js';
import type { rootStream } from '../../../harness/random.js';
import type { CellRow } from '../../../harness/row.js';
import type { GuardSide } from '../../../results/guard/side.js';
import { makeRow } from '../made-ledger.js';

/** A plan with the labels given, behind an open curtain. */
export function makePlan(
  tasks: readonly string[],
  methods: readonly string[],
  parts: Partial<Plan> = {},
): Plan {
  return {
    ...{ name: 'made', seed: 1, seeds: 4, pool: 100, batch: 8, budgetSeconds: 60, backend: 'wasm', keep: [] },
    tasks: tasks.map((label) => ({ label, family: label, settings: {}, curtains: [{}] })),
    methods: methods.map((label) => ({ label, method: label, settings: {} })),
    ...parts,
  };
}

/** One side of a guard, with the rows given. */
export function makeSide(name: string, plan: Plan, rows: readonly CellRow[]): GuardSide {
  return { name, provenance: { plan, program: '0.1.0', node: 'v20.19.0', backend: 'wasm' }, rows };
}

/** Rows of every method, task and seed of a plan, each with the best that `bestOf` gives. */
export function makeRows(
  plan: Plan,
  bestOf: (method: string, task: string, seed: number) => number,
): CellRow[] {
  return plan.tasks.flatMap(({ label: task }) =>
    plan.methods.flatMap(({ label: method }) =>
      Array.from({ length: plan.seeds }, (_, i) =>
        makeRow({ task, curtain: 'open', method, seed: i + 1, best: bestOf(method, task, i + 1) }),
      ),
    ),
  );
}

/** A skewed score with mean 0.7 and deviation 0.1, as scores of batches often are. */
export function skewedScore(stream: ReturnType<typeof rootStream>): number {
  return 0.8 + 0.1 * Math.log(1 - stream.uniform());
}
