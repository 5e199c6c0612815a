import { OnebatchError } from '../harness/errors.js';
import type { Halved } from '../harness/plan/plan.js';
import { type CellRow, cellId } from '../harness/row.js';
import type { PairedScore } from './paired.js';
import { type ChosenVariant, chooseVariant } from './sweep/choose-variant.js';
import { choosingHalf, type Half } from './sweep/halves.js';
import type { Sweep, SweepPlan } from './sweep/sweep-plan.js';

/** How the settings of one method were chosen. */
export interface SweepChoice extends ChosenVariant {
  /** The label that the chosen variant is reported under. */
  readonly method: string;
  /** How many variants there were to choose from. */
  readonly variants: number;
  /** The score of the choice. */
  readonly by: PairedScore;
}

/** How the settings of all sweeps of a comparison were chosen, and on what. */
export interface SweepChoices {
  /** What was halved; `same cells` where settings were chosen on the very cells that are reported. */
  readonly on: Halved | 'same cells';
  /** Tasks that settings were chosen on, where tasks were halved. */
  readonly choosingTasks: readonly string[];
  readonly choices: readonly SweepChoice[];
}

/** A ledger's rows after choosing. */
export interface ChosenRows {
  /** The cells to report; the chosen variant of each sweep stands under the sweep's label, and the others are gone. */
  readonly rows: readonly CellRow[];
  /** Seconds by the identity of these rows. */
  readonly seconds: ReadonlyMap<string, number>;
  /** Null where there was nothing to choose. */
  readonly sweeps: SweepChoices | null;
}

export interface ChooseOptions {
  /** Seconds by cell identity. */
  readonly seconds: ReadonlyMap<string, number>;
  /** The score to choose by. */
  readonly score: PairedScore;
  /** Whether to choose and report on all cells, which makes the chosen scores too high; false unless given. */
  readonly sameCells?: boolean;
}

/**
 * The rows to compare: all of them where the plan has no sweep, else those that `chooseSettings` leaves.
 *
 * @throws OnebatchError (`bad-input`) where the same cells are asked for without a sweep; see also `chooseSettings`.
 */
export function rowsToReport(
  rows: readonly CellRow[],
  plan: SweepPlan | undefined,
  options: ChooseOptions,
): ChosenRows {
  if (plan !== undefined) return chooseSettings(rows, plan, options);
  if (options.sameCells === true)
    throw new OnebatchError('bad-input', '--same-cells: the plan sweeps no setting; leave it out');
  return { rows, seconds: options.seconds, sweeps: null };
}

/**
 * Chooses the settings of every sweep on one half of the cells, and gives the rows of the other half to report. What is
 * reported had no part in the choice, so that its means are those of the chosen settings, free of the winner's curse.
 * All methods are reported on the same half, so that they stay paired.
 *
 * @throws OnebatchError (`bad-ledger`) where a half lacks the cells of a sweep, or another method has its label.
 */
export function chooseSettings(
  rows: readonly CellRow[],
  plan: SweepPlan,
  options: ChooseOptions,
): ChosenRows & { readonly sweeps: SweepChoices } {
  const { seconds, sameCells = false } = options;
  const choosing = choosingHalf(plan.on, plan.tasks);
  const chooses: Half = (row) => sameCells || choosing(row);
  const reports: Half = (row) => sameCells || !choosing(row);
  const choices = plan.sweeps.map((sweep) => chooseOne(rows, sweep, chooses, options));
  const label = labelsOf(plan, choices);
  const kept = rows.flatMap((row) => {
    const method = reports(row) ? label(row.method) : undefined;
    return method === undefined ? [] : [{ row, renamed: { ...row, method } }];
  });
  for (const { method } of choices) {
    if (!kept.some(({ renamed }) => renamed.method === method)) refuse(method, 'no cell to report');
  }
  return {
    rows: kept.map(({ renamed }) => renamed),
    seconds: new Map(
      kept.flatMap(({ row, renamed }) => {
        const time = seconds.get(cellId(row));
        return time === undefined ? [] : [[cellId(renamed), time] as const];
      }),
    ),
    sweeps: {
      on: sameCells ? 'same cells' : plan.on,
      choosingTasks:
        sameCells || plan.on === 'seeds' ? [] : plan.tasks.filter((task) => choosing({ task, seed: 0 })),
      choices,
    },
  };
}

function chooseOne(
  rows: readonly CellRow[],
  { method, variants }: Sweep,
  chooses: Half,
  { score, sameCells = false }: ChooseOptions,
): SweepChoice {
  if (rows.some((row) => row.method === method))
    throw new OnebatchError(
      'bad-ledger',
      `${method} is a sweep in one ledger and a method in another; compare each alone`,
    );
  const labels = variants.map(({ label }) => label);
  const known = new Set(labels);
  const ours = rows.filter((row) => known.has(row.method) && chooses(row));
  const chosen = chooseVariant(ours, labels, score);
  if (chosen === undefined)
    refuse(method, `no cell${sameCells ? '' : ' to choose on'} that all its ${labels.length} variants have`);
  return { method, variants: labels.length, by: score, ...chosen };
}

/** The label to report a method under; `undefined` for variants that were not chosen. */
function labelsOf({ sweeps }: SweepPlan, choices: readonly SweepChoice[]) {
  const variants = new Set(sweeps.flatMap((sweep) => sweep.variants.map(({ label }) => label)));
  const chosen = new Map(choices.map(({ method, variant }) => [variant, method]));
  return (method: string): string | undefined => (variants.has(method) ? chosen.get(method) : method);
}

function refuse(method: string, lacking: string): never {
  throw new OnebatchError(
    'bad-ledger',
    `the sweep of ${method} has ${lacking} yet; go on with the rehearsal`,
  );
}
