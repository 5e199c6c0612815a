import type { OptimumKnowledge } from '../../harness/task.js';
import type { ShareEstimate } from '../estimate.js';
import type { Outcomes } from '../paired.js';
import type { CountRange, Section } from '../section.js';
import type { Decision } from '../verdict.js';

/** How the row of the line to beat is named. */
export const bestVisibleLabel = 'best visible';

/** What 1 stands for on one task, as in "1 = published optimum". */
export function describeTop(known: readonly OptimumKnowledge[]): string {
  const words = { published: 'published optimum', exact: 'exact optimum', 'best-known': 'best known score' };
  return `1 = ${known.map((kind) => words[kind]).join(' or ')}`;
}

/** The facts of a section, as in "curtain ceiling=0.5", "16 seeds", "batch of 128", "200 visible rows". */
export function describeSection({ curtain, seeds, batch, visible }: Section): string[] {
  return [
    `curtain ${curtain === '' ? 'none' : curtain}`,
    plural(seeds, 'seed'),
    `batch of ${describeRange(batch)}`,
    `${describeRange(visible)} visible row${visible.most === 1 ? '' : 's'}`,
  ];
}

/** What the table over all tasks is over, as in "4 tasks". */
export function describeTasks(sections: readonly Section[]): string {
  const tasks = new Set(sections.map(({ task }) => task)).size;
  if (tasks === sections.length) return plural(tasks, 'task');
  return `${plural(tasks, 'task')} behind ${sections.length} curtains in all`;
}

/** How many of the values, from high to low, stand above the line to beat: where its row belongs. */
export function countAbove(values: readonly number[], line: number): number {
  return values.filter((value) => value > line).length;
}

/** A count with its noun. */
export function plural(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

function describeRange({ least, most }: CountRange): string {
  return least === most ? `${least}` : `${least} to ${most}`;
}

/** A verdict, as in "helps" or "undecided (40)", with the seeds a task that would decide it. */
export function describeDecision({ verdict, seedsNeeded }: Decision): string {
  if (seedsNeeded === null) return verdict;
  if (seedsNeeded.kind === 'unknown') return `${verdict} (1 seed)`;
  const seeds = seedsNeeded.seeds.toLocaleString('en-US');
  return `${verdict} (${seedsNeeded.kind === 'more-than' ? '>' : ''}${seeds})`;
}

/** Pairs won, tied and lost, as in "7/1/0". */
export function describeOutcomes({ wins, ties, losses }: Outcomes): string {
  return `${wins}/${ties}/${losses}`;
}

/** A share with its interval, as in "88 % [53, 98]". */
export function describeShare({ share, low, high }: ShareEstimate): string {
  const percent = (value: number): string => (100 * value).toFixed(0);
  return `${percent(share)} % [${percent(low)}, ${percent(high)}]`;
}
