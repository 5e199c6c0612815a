import { canonicalJson } from '../../harness/canonical.js';
import { settingsHash } from '../../harness/cells.js';
import { OnebatchError } from '../../harness/errors.js';
import type { Halved, Plan } from '../../harness/plan/plan.js';

/** A method of which a plan tries several settings. */
export interface Sweep {
  /** The label under which the chosen variant is reported. */
  readonly method: string;
  /** In the plan's order. */
  readonly variants: readonly SweptVariant[];
}

/** One of the settings that a sweep tries. */
export interface SweptVariant {
  /** How the ledger names it. */
  readonly label: string;
  /** Hash of its settings. */
  readonly settings: string;
}

/** What there is to choose in a plan, and how. */
export interface SweepPlan {
  readonly on: Halved;
  /** The tasks' labels, in the plan's order. */
  readonly tasks: readonly string[];
  /** At least one. */
  readonly sweeps: readonly Sweep[];
}

/** The sweeps of a plan; `undefined` where it has none, as the plans of older ledgers. */
export function sweepPlanOf({ methods, tasks, choose }: Plan): SweepPlan | undefined {
  const variants = new Map<string, SweptVariant[]>();
  for (const method of methods) {
    const { label, sweep } = method;
    if (sweep === undefined) continue;
    variants.set(sweep, [...(variants.get(sweep) ?? []), { label, settings: settingsHash(method) }]);
  }
  if (variants.size === 0) return undefined;
  return {
    on: choose?.on ?? 'seeds',
    tasks: tasks.map(({ label }) => label),
    sweeps: [...variants].map(([method, list]) => ({ method, variants: list })),
  };
}

/** Labels of a plan's methods as comparisons name them: a sweep once, in its first variant's place. */
export function reportedLabels({ methods }: Pick<Plan, 'methods'>): string[] {
  return [...new Set(methods.map(({ label, sweep }) => sweep ?? label))];
}

/**
 * What there is to choose in several ledgers together; those without a sweep are reported on the half of the others.
 *
 * @throws OnebatchError (`bad-ledger`) where plans choose on other halves, or a sweep has other variants.
 */
export function mergeSweepPlans(plans: readonly (SweepPlan | undefined)[]): SweepPlan | undefined {
  const [first, ...others] = plans.filter((plan) => plan !== undefined);
  if (first === undefined) return undefined;
  const sweeps = new Map(first.sweeps.map((sweep) => [sweep.method, sweep]));
  for (const { on, tasks, sweeps: more } of others) {
    if (on !== first.on || (on === 'tasks' && canonicalJson(tasks) !== canonicalJson(first.tasks)))
      refuse('the plans choose the settings of their sweeps on other halves');
    for (const sweep of more) {
      const known = sweeps.get(sweep.method) ?? sweep;
      if (canonicalJson(known) !== canonicalJson(sweep))
        refuse(`the plans sweep other settings of ${sweep.method}`);
      sweeps.set(sweep.method, sweep);
    }
  }
  return { ...first, sweeps: [...sweeps.values()] };
}

function refuse(what: string): never {
  throw new OnebatchError(
    'bad-ledger',
    `the ledgers can't be compared together, as ${what}; compare each alone`,
  );
}
