import type { TaskScores } from './score-table.js';
import { percent } from './study.js';
import type { Tally } from './tally.js';

/** One task, or how many. */
export function taskWords(tasks: 'one' | 'all', scores: readonly TaskScores[]): string {
  return tasks === 'one' ? '1' : String(scores.length);
}

/** The task with the largest or smallest share, in words. */
export function hardest(
  scores: readonly TaskScores[],
  tallies: readonly Tally[],
  which: 'most' | 'least',
): string {
  const share = ({ hits, trials }: Tally) => (which === 'most' ? hits / trials : -hits / trials);
  const worst = tallies.reduce((found, tally, i) => (share(tally) > share(tallies[found]!) ? i : found), 0);
  const { hits, trials } = tallies[worst]!;
  return `${scores[worst]!.task}: ${percent(hits / trials)}`;
}
