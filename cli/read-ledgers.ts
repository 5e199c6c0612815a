import { stat } from 'node:fs/promises';
import { basename, dirname } from 'node:path';
import { OnebatchError } from '../harness/errors.js';
import { ledgerName, readLedger } from '../results/ledger.js';
import { readManifest } from '../results/manifest.js';
import type { ReadLedger } from '../results/merge-ledgers.js';
import type { PlanOrder } from '../results/scores.js';
import { reportedLabels, type SweepPlan, sweepPlanOf } from '../results/sweep/sweep-plan.js';

/** A ledger with what its manifest, where there is one, says of its plan. */
export interface FoundLedger extends ReadLedger {
  readonly seed?: number;
  readonly order?: PlanOrder;
  readonly looks?: readonly number[] | undefined;
  readonly sweeps?: SweepPlan | undefined;
}

/**
 * Reads ledgers, each named by its folder or by the path of its `ledger.csv`.
 *
 * @throws OnebatchError (`bad-input`, `bad-ledger`) naming the first that can't be read.
 */
export async function readLedgers(places: readonly string[]): Promise<FoundLedger[]> {
  if (places.length === 0)
    throw new OnebatchError('bad-input', 'name a ledger: the folder that a rehearsal wrote');
  const ledgers: FoundLedger[] = [];
  for (const place of places) {
    const folder = await folderOf(place);
    const { rows, seconds } = await readLedger(folder);
    const plan = (await readManifest(folder))?.plan;
    ledgers.push({
      place,
      rows,
      seconds,
      ...(plan === undefined
        ? {}
        : {
            seed: plan.seed,
            looks: plan.looks,
            sweeps: sweepPlanOf(plan),
            order: {
              tasks: plan.tasks.map(({ label }) => label),
              methods: reportedLabels(plan),
            },
          }),
    });
  }
  return ledgers;
}

async function folderOf(place: string): Promise<string> {
  const found = await stat(place).catch(() => undefined);
  if (found === undefined)
    throw new OnebatchError(
      'bad-input',
      `${place}: there is no such ledger; name a folder that a rehearsal wrote`,
    );
  if (found.isDirectory()) return place;
  if (basename(place) === ledgerName) return dirname(place);
  throw new OnebatchError('bad-input', `${place}: is no ledger; name a folder or its ${ledgerName}`);
}
