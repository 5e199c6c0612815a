import { OnebatchError } from '../../harness/errors.js';
import { suggestion } from '../../harness/nearest-word.js';
import { listSome } from './list-words.js';
import type { GuardSide } from './side.js';

/** The labels that are compared, and those that aren't. */
export interface ChosenMethods {
  /** In the candidate's order, at least one. */
  readonly methods: readonly string[];
  /** Labels that only one ledger holds, in words; empty where methods were asked for by name. */
  readonly remarks: readonly string[];
}

/**
 * Chooses the methods that both ledgers hold, or those asked for.
 *
 * @param wanted the labels asked for, or the text `a,b` as typed: labels may hold commas themselves.
 * @throws OnebatchError (`bad-input`) for a label that a ledger doesn't hold; (`bad-ledger`) for none in common.
 */
export function chooseMethods(before: GuardSide, after: GuardSide, wanted?: string): ChosenMethods {
  const [old, now] = [labelsOf(before), labelsOf(after)];
  const common = now.filter((label) => old.includes(label));
  if (wanted !== undefined) {
    const labels = splitLabels(wanted, [...new Set([...old, ...now])]);
    refuseMissing(before, old, labels);
    refuseMissing(after, now, labels);
    return { methods: now.filter((label) => labels.includes(label)), remarks: [] };
  }
  if (common.length === 0)
    throw new OnebatchError(
      'bad-ledger',
      `${before.name} and ${after.name} can't be paired, they have no method in common (${describe(old)}; ${describe(now)}); give methods the same label with "as"`,
    );
  return {
    methods: common,
    remarks: [...onlyIn('baseline', old, common), ...onlyIn('candidate', now, common)],
  };
}

/** Splits at the commas between labels; the longest known label counts where several fit. */
export function splitLabels(text: string, known: readonly string[]): string[] {
  const labels: string[] = [];
  let rest = text;
  while (rest !== '') {
    const fitting = known.filter((label) => rest === label || rest.startsWith(`${label},`));
    const [first = ''] = rest.split(',', 1);
    const label = fitting.reduce((longest, it) => (it.length > longest.length ? it : longest), first);
    labels.push(label);
    rest = rest.slice(label.length + 1);
  }
  return labels.map((label) => label.trim());
}

function refuseMissing(side: GuardSide, held: readonly string[], wanted: readonly string[]): void {
  if (wanted.length === 0)
    throw new OnebatchError('bad-input', '--methods: is empty; name methods as in a,b');
  for (const label of wanted) {
    if (held.includes(label)) continue;
    throw new OnebatchError(
      'bad-input',
      `--methods: ${side.name} holds no method "${label}"; ${suggestion(label, held)}`,
    );
  }
}

/** Labels of which there are rows, those of the plan first. */
function labelsOf({ provenance, rows }: GuardSide): string[] {
  const there = new Set(rows.map(({ method }) => method));
  const planned = provenance.plan.methods.map(({ label }) => label).filter((label) => there.has(label));
  return [...new Set([...planned, ...there])];
}

function onlyIn(side: string, labels: readonly string[], common: readonly string[]): string[] {
  const left = labels.filter((label) => !common.includes(label));
  return left.length === 0 ? [] : [`only in the ${side}, so not compared: ${listSome(left, ', ')}`];
}

function describe(labels: readonly string[]): string {
  return labels.length === 0 ? 'none' : listSome(labels, ', ');
}
