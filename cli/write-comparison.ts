import { join } from 'node:path';
import type { Plan } from '../harness/plan/plan.js';
import { type Comparison, compareRows } from '../results/comparison.js';
import { type Ledger, replaceFile } from '../results/ledger.js';
import { tableFormats } from '../results/tables/index.js';
import { version } from './package-root.js';

/** Compares a ledger's rows, writes `comparison.*` beside it, and returns what they say. */
export async function writeComparison(folder: string, plan: Plan, ledger: Ledger): Promise<Comparison> {
  const comparison = compareRows(ledger.rows, {
    version,
    seconds: ledger.seconds,
    seed: plan.seed,
    looks: plan.looks,
    order: { tasks: plan.tasks.map(({ label }) => label), methods: plan.methods.map(({ label }) => label) },
  });
  for (const { file, render } of tableFormats)
    await replaceFile(join(folder, file), await render(comparison));
  return comparison;
}
