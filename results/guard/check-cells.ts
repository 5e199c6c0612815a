import { OnebatchError } from '../../harness/errors.js';
import type { CellRow } from '../../harness/row.js';
import { countOf, listSome } from './list-words.js';
import type { LedgerSection } from './sections.js';
import type { GuardSide } from './side.js';

/** Numbers of the same cell that differ by more than this share were not measured on the same instance. */
export const sameNumber = 1e-9;

/**
 * Refuses a section in which a method lacks seeds that another has, as in a ledger that isn't finished, or stands with
 * several settings.
 *
 * @throws OnebatchError (`bad-ledger`) naming the method, the task and the seeds.
 */
export function checkWhole(side: GuardSide, section: LedgerSection, methods: readonly string[]): void {
  const place = describePlace(section);
  for (const method of methods) {
    const own = section.rows.get(method) ?? [];
    if (new Set(own.map(({ settings }) => settings)).size > 1)
      throw new OnebatchError(
        'bad-ledger',
        `${side.name} holds "${method}" with several settings on ${place}; give each a label of its own with "as"`,
      );
    const there = new Set(own.map(({ seed }) => seed));
    const missing = section.seeds.filter((seed) => !there.has(seed));
    if (missing.length === 0) continue;
    throw new OnebatchError(
      'bad-ledger',
      `${side.name} lacks ${countOf(missing.length, 'seed')} of "${method}" on ${place}: ${listSome(missing.map(String), ', ')}; run its plan to the end`,
    );
  }
}

/**
 * Refuses two rows of a cell that did not face the same instance, pool and curtain, as when a task was changed.
 * Another processor's rounding is let pass.
 *
 * @throws OnebatchError (`bad-ledger`) naming the cell and what differs.
 */
export function checkInstance(before: GuardSide, after: GuardSide, old: CellRow, now: CellRow): void {
  const range = Math.max(old.top - old.floor, now.top - now.floor);
  const numbers = [
    ['a floor', old.floor, now.floor, range],
    ['a top', old.top, now.top, range],
    ['a best visible score', old.bestVisible, now.bestVisible, 1],
    ['visible rows', old.visible, now.visible, 0],
    ['a batch size', old.batch, now.batch, 0],
  ] as const;
  for (const [what, a, b, scale] of numbers) {
    if (Math.abs(a - b) <= sameNumber * Math.max(scale, Math.abs(a), Math.abs(b))) continue;
    throw new OnebatchError(
      'bad-ledger',
      `${before.name} and ${after.name} can't be paired, ${describePlace(now)} is not the same in both: for seed ${now.seed} of "${now.method}" they have ${what} of ${a} and ${b}; was the task changed between the versions ${before.provenance.program} and ${after.provenance.program}? Then rehearse the baseline anew`,
    );
  }
}

/** A task and its curtain in one word. */
export function describePlace({
  task,
  curtain,
}: {
  readonly task: string;
  readonly curtain: string;
}): string {
  return `${task} (${curtain})`;
}
