import { curtainLabel } from '../../harness/curtain.js';
import { OnebatchError } from '../../harness/errors.js';
import type { CellRow } from '../../harness/row.js';
import { type PairedScore, pairRows, type TaskPairs } from '../paired.js';
import { checkInstance, checkWhole, describePlace, sameNumber } from './check-cells.js';
import { chooseMethods } from './choose-methods.js';
import { checkPlans, remarkPlans } from './compare-plans.js';
import { countOf } from './list-words.js';
import { type LedgerSection, placeOf, sectionsOf } from './sections.js';
import type { GuardSide } from './side.js';

/** One method before and after, on one task behind one curtain. */
export interface GuardPairs extends TaskPairs {
  /** Failed cells among the pairs. */
  readonly failures: { readonly before: number; readonly after: number };
}

/** One method before and after. */
export interface MethodPairs {
  readonly method: string;
  /** One for each task behind each curtain, the same for all methods, in the order of the baseline's plan. */
  readonly sections: readonly GuardPairs[];
}

/** Two ledgers, cell beside cell. */
export interface PairedLedgers {
  readonly methods: readonly MethodPairs[];
  /** What a reader should know of the pairing, in words. */
  readonly remarks: readonly string[];
}

/**
 * Puts the cells of two ledgers beside one another: the same task, curtain, method label and seed. Differences are the
 * candidate's score minus the baseline's; those below 1e-9, as another processor's rounding gives, are 0.
 *
 * @param options.methods labels to pair, as `a,b`; those that both ledgers hold unless given.
 * @throws OnebatchError (`bad-ledger`) saying why the two can't be paired: other plan, other instance of a task, a
 * ledger that isn't finished, no seed or no method in common; (`bad-input`) for a method that isn't there.
 */
export function pairLedgers(
  before: GuardSide,
  after: GuardSide,
  options: { readonly score: PairedScore; readonly methods?: string | undefined },
): PairedLedgers {
  checkPlans(before, after);
  const { methods, remarks } = chooseMethods(before, after, options.methods);
  const places = pairSections(before, after, methods);
  for (const [old, now] of places) {
    checkWhole(before, old, methods);
    checkWhole(after, now, methods);
  }
  const pairs = methods.map((method) => ({
    method,
    sections: places.map(([old, now]) => {
      const rows = [old.rows.get(method) ?? [], now.rows.get(method) ?? []] as const;
      return pairCells(before, after, rows, options.score);
    }),
  }));
  return {
    methods: pairs,
    remarks: [
      ...remarkPlans(before, after, methods),
      ...remarks,
      ...places.flatMap((place) => remarkSeeds(...place)),
    ],
  };
}

/** The sections of both ledgers beside one another, in the order of the baseline's plan. */
function pairSections(
  before: GuardSide,
  after: GuardSide,
  methods: readonly string[],
): [LedgerSection, LedgerSection][] {
  const [old, now] = [sectionsOf(before.rows, methods), sectionsOf(after.rows, methods)];
  const planned = before.provenance.plan.tasks.flatMap(({ label, curtains }) =>
    curtains.map((curtain) => placeOf({ task: label, curtain: curtainLabel(curtain) })),
  );
  const there = planned.filter((place) => old.has(place) || now.has(place));
  return [...new Set([...there, ...old.keys(), ...now.keys()])].map((place) => {
    const [mine, other] = [old.get(place), now.get(place)];
    if (mine !== undefined && other !== undefined && commonSeeds(mine, other).length > 0)
      return [mine, other];
    throw new OnebatchError(
      'bad-ledger',
      `${before.name} and ${after.name} can't be paired, they have no seed of ${describePlace((mine ?? other)!)} in common; run both plans to the end`,
    );
  });
}

/** One method's cells of one section; both sides share at least one seed. */
function pairCells(
  before: GuardSide,
  after: GuardSide,
  [old, now]: readonly [readonly CellRow[], readonly CellRow[]],
  score: PairedScore,
): GuardPairs {
  const [pairs] = pairRows(now, old, score) as [TaskPairs];
  const known = new Map(old.map((row) => [row.seed, row]));
  const failures = { before: 0, after: 0 };
  for (const row of now) {
    const other = known.get(row.seed);
    if (other === undefined) continue;
    checkInstance(before, after, other, row);
    failures.before += Number(other.status === 'failed');
    failures.after += Number(row.status === 'failed');
  }
  const differences = pairs.differences.map((value) => (Math.abs(value) < sameNumber ? 0 : value));
  return { ...pairs, differences, failures };
}

function remarkSeeds(old: LedgerSection, now: LedgerSection): string[] {
  const common = commonSeeds(old, now).length;
  if (common === old.seeds.length && common === now.seeds.length) return [];
  return [
    `${describePlace(now)}: ${countOf(common, 'seed')} in common, of ${old.seeds.length} in the baseline and ${now.seeds.length} in the candidate`,
  ];
}

function commonSeeds(old: LedgerSection, now: LedgerSection): number[] {
  const there = new Set(now.seeds);
  return old.seeds.filter((seed) => there.has(seed));
}
