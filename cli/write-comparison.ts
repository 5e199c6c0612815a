import { join } from 'node:path';
import type { Plan } from '../harness/plan/plan.js';
import { type Comparison, compareRows } from '../results/comparison.js';
import { type Ledger, replaceFile } from '../results/ledger.js';
import { reportedLabels, sweepPlanOf } from '../results/sweep/sweep-plan.js';
import { rowsToReport } from '../results/sweep.js';
import { tableFormats } from '../results/tables/index.js';
import { version } from './package-root.js';

/**
 * Compares a ledger's rows, writes `comparison.*` beside it, and returns what they say.
 *
 * @param sameCells whether the plan's sweeps, if any, are chosen on the cells that are reported.
 */
export async function writeComparison(
  folder: string,
  { plan, sameCells }: { readonly plan: Plan; readonly sameCells: boolean },
  ledger: Ledger,
): Promise<Comparison> {
  const { rows, seconds, sweeps } = rowsToReport(ledger.rows, sweepPlanOf(plan), {
    seconds: ledger.seconds,
    score: 'best',
    sameCells,
  });
  const comparison = compareRows(rows, {
    version,
    seconds,
    sweeps,
    seed: plan.seed,
    looks: plan.looks,
    order: { tasks: plan.tasks.map(({ label }) => label), methods: reportedLabels(plan) },
  });
  for (const { file, render } of tableFormats)
    await replaceFile(join(folder, file), await render(comparison));
  return comparison;
}
