import type { Looks } from './decide-at-looks.js';
import { formatP } from './format-number.js';
import type { Overall } from './overall.js';
import type { Ranks } from './ranks.js';
import type { Against, AgainstReference, ReferenceBlock } from './reference.js';
import type { Section } from './section.js';
import { defaultFlips, exactUpTo } from './statistics/sign-flip.js';
import { plannedPower, smallestAdjustedP } from './verdict.js';

/** How methods were held against the reference, in sentences; empty where there was none to compare. */
export function describeComparison(
  sections: readonly Section[],
  overall: Overall | null,
  against: Against,
): string[] {
  const blocks = sections.flatMap(({ reference }) => reference ?? []);
  if (blocks.length === 0) return [];
  return [
    describeDifference(blocks, overall?.reference ?? null, against),
    describeTest(blocks),
    describeVerdict(against),
    ...(against.looks === null ? [] : [describeLooks(against.looks, against.alpha)]),
    `w/t/l: pairs won, tied and lost, with the difference above, within and below ±${against.margin}; beat visible: cells with a design better than the best visible one (Wilson 1927).`,
    ...describeFewPairs(blocks, against),
    ...(overall === null ? [] : [describeRanks(overall.ranks)]),
  ];
}

function describeDifference(
  blocks: readonly ReferenceBlock[],
  overall: ReferenceBlock | null,
  { method, score }: Against,
): string {
  const inAll = overall === null ? '' : `, ${pairsOf([overall])} over all tasks`;
  const kinds = new Set(
    [...blocks, ...(overall === null ? [] : [overall])].flatMap(({ methods }) =>
      methods.map(({ difference }) => difference.interval?.method),
    ),
  );
  const words = [
    ...(kinds.has('student-t') ? ["Student's t"] : []),
    ...(kinds.has('stratified-t') ? ["over all tasks t with Satterthwaite's degrees of freedom"] : []),
  ];
  const intervals =
    words.length === 0
      ? ''
      : `; 95 % intervals, each for its own method and not corrected for their number: ${words.join(', ')}`;
  return `difference: ${score} minus that of ${method}, paired by task, curtain and seed, ${pairsOf(blocks)} a task${inAll}${intervals}.`;
}

function describeTest(blocks: readonly ReferenceBlock[]): string {
  const tests = rangeOf(blocks.map(({ methods }) => methods.length));
  return `p: two-sided sign-flip test (Fisher 1935) by all patterns of signs up to ${exactUpTo} pairs and ${defaultFlips.toLocaleString('en-US')} drawn ones beyond, corrected for the ${tests} test${tests === '1' ? '' : 's'} of a table (Holm 1979).`;
}

function describeVerdict({ margin, alpha }: Against): string {
  return `verdict: helps or hurts: p < ${alpha} and the interval excludes 0; no real difference: within ±${margin} by two one-sided t tests (Schuirmann 1987), Holm-corrected as a family of their own, p < ${alpha}; undecided: neither, with the seeds a task that would decide at ${100 * plannedPower} % power if more are like these.`;
}

/** What held the verdicts when seeds were added until they were reached. */
function describeLooks({ planned, made }: Looks, alpha: number): string {
  const at = planned.slice(0, made);
  const where = at.length === 0 ? '' : `, at ${at.join(', ')} seeds`;
  return `Seeds were added until decided: ${count(made, 'look')} of ${planned.length} planned${where} (${planned.at(-1)} at most). Verdicts are those of the looks, by the same tests: no more than ${100 * alpha} % of such tables hold a wrong one however often one looks, by O'Brien-Fleming type spending (Lan & DeMets 1983) in Holm's steps (Ye et al. 2013). p and intervals take the seeds as if their number had been fixed; after an early end differences tend to be overstated.`;
}

/** Says so where a task has too few pairs for any method to help or hurt. */
function describeFewPairs(blocks: readonly ReferenceBlock[], { alpha }: Against): string[] {
  const [worst] = blocks
    .map(({ methods }) => ({ pairs: Math.max(...methods.map(({ pairs }) => pairs)), tests: methods.length }))
    .filter(({ pairs, tests }) => smallestAdjustedP(pairs, tests) >= alpha)
    .sort((a, b) => a.pairs - b.pairs);
  if (worst === undefined) return [];
  let enough = worst.pairs;
  while (smallestAdjustedP(enough, worst.tests) >= alpha) enough += 1;
  return [
    `${count(worst.pairs, 'pair')} and ${count(worst.tests, 'test')} allow no p below ${formatP(smallestAdjustedP(worst.pairs, worst.tests))}: to help or hurt on a single task takes ${enough} seeds at least.`,
  ];
}

function describeRanks(ranks: Ranks | null): string {
  if (ranks === null) return 'No ranks: fewer than two methods have cells on all tasks.';
  const { tasks, methods, F, degreesOfFreedom, p, criticalDifference, tooFewTasks, leftOut } = ranks;
  const statistic = F === null ? 'infinite' : F.toFixed(2);
  const few = tooFewTasks
    ? `, more than any two of ${methods.length} can differ by: too few tasks to tell methods apart by rank`
    : '';
  const without = leftOut.length === 0 ? '' : ` Not ranked, for they lack tasks: ${leftOut.join(', ')}.`;
  return `rank: mean over ${tasks} tasks, 1 is best, ties averaged; Friedman's test, F(${degreesOfFreedom.join(', ')}) = ${statistic} by Iman & Davenport (1980), p ${asEquation(p)}; ranks closer than the critical difference can't be told apart at 5 % (Nemenyi 1963; Demšar 2006), here ${criticalDifference.toFixed(2)}${few}. ${describeGroups(ranks)}${without}`;
}

function describeGroups({ groups }: Ranks): string {
  if (groups.length === 0) return 'All mean ranks differ by more than that.';
  return `Not told apart: ${groups.map((group) => group.join(', ')).join('; ')}.`;
}

/** A p as in "= 0.031" or "< 0.001". */
function asEquation(p: number): string {
  const text = formatP(p);
  return text.startsWith('<') ? text.replace('<', '< ') : `= ${text}`;
}

function pairsOf(blocks: readonly ReferenceBlock[]): string {
  const pairs = blocks.flatMap(({ methods }) => methods.map((it: AgainstReference) => it.pairs));
  const range = rangeOf(pairs);
  return `${range} pair${range === '1' ? '' : 's'}`;
}

function rangeOf(counts: readonly number[]): string {
  const least = counts.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const most = counts.reduce((a, b) => Math.max(a, b), 0);
  return least === most ? `${most}` : `${least} to ${most}`;
}

function count(number: number, noun: string): string {
  return `${number} ${noun}${number === 1 ? '' : 's'}`;
}
