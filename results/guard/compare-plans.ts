import { curtainLabel } from '../../harness/curtain.js';
import { OnebatchError } from '../../harness/errors.js';
import type { Plan, PlannedMethod } from '../../harness/plan/plan.js';
import { differences } from '../manifest.js';
import { listSome } from './list-words.js';
import type { GuardSide } from './side.js';

/**
 * Refuses two ledgers whose plans don't set the same stages. What may differ: the program, the methods with their
 * settings, the number of seeds, and the random numbers, time and arithmetic that methods are given.
 *
 * @throws OnebatchError (`bad-ledger`) saying what differs.
 */
export function checkPlans(before: GuardSide, after: GuardSide): void {
  const changes = differences(stagesOf(before.provenance.plan), stagesOf(after.provenance.plan));
  if (changes.length === 0) return;
  throw new OnebatchError(
    'bad-ledger',
    `${before.name} and ${after.name} can't be paired, their plans differ (${listSome(changes)}); rehearse the candidate with the baseline's plan`,
  );
}

/** What else differs between the two rehearsals and could move scores, in words; empty where nothing does. */
export function remarkPlans(before: GuardSide, after: GuardSide, methods: readonly string[]): string[] {
  const [old, now] = [before.provenance, after.provenance];
  const remarks: string[] = [];
  const note = (what: string, a: unknown, b: unknown): void => {
    if (a !== b) remarks.push(`${what}: ${a} in the baseline, ${b} in the candidate`);
  };
  note('seconds a method may take for a cell', old.plan.budgetSeconds, now.plan.budgetSeconds);
  note("the networks' arithmetic", old.backend, now.backend);
  note('methodSeed', old.plan.methodSeed ?? old.plan.seed, now.plan.methodSeed ?? now.plan.seed);
  for (const label of methods) {
    const changes = differences(describeMethod(old.plan, label), describeMethod(now.plan, label));
    if (changes.length > 0) remarks.push(`${label} has other settings: ${listSome(changes)}`);
  }
  return remarks;
}

/** All that fixes task instances, pools, curtains and noise, whatever the order in which the plan names them. */
function stagesOf({ seed, pool, batch, tasks }: Plan): unknown {
  const entries = tasks.map(({ label, family, settings, curtains }) => {
    return [label, { family, settings, curtains: curtains.map(curtainLabel).sort().join(' | ') }];
  });
  return { seed, pool, batch, tasks: Object.fromEntries(entries) };
}

function describeMethod(plan: Plan, label: string): Pick<PlannedMethod, 'method' | 'settings'> | undefined {
  const planned = plan.methods.find((method) => method.label === label);
  return planned && { method: planned.method, settings: planned.settings };
}
