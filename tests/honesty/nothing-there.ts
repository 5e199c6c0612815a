import { type Stream, sampleWithout } from '../../harness/random.js';
import { centredDifferencesOf, drawCopies, drawPositions, pick, scatteredMethods } from './draws.js';
import type { TaskScores } from './score-table.js';

/**
 * Two ways in which no method differs from the reference.
 *
 * - `itself`: the reference is a method, and the others are the same with other random numbers.
 * - `skewed`: real differences of other methods, moved so that each has a mean of zero: as skewed as they come.
 */
export type Null = 'itself' | 'skewed';

/** How the tables say it. */
export const nullWords: Readonly<Record<Null, string>> = {
  itself: 'itself, other random numbers',
  skewed: 'others, moved to mean 0',
};

/** Methods with scores of many streams. */
const copied = ['jitter', 'ridge-genetic'];

/** Draws differences to the reference where there are none to find, (methods, tasks, seeds). */
export function drawNothing(
  kind: Null,
  tasks: readonly TaskScores[],
  { methods, seeds, stream }: { readonly methods: number; readonly seeds: number; readonly stream: Stream },
): number[][][] {
  const byTask = tasks.map((task) => {
    if (kind === 'itself') {
      const method = copied[stream.below(copied.length)]!;
      return drawCopies(task, method, { copies: methods, n: seeds, stream });
    }
    const names = scatteredMethods(task);
    const chosen = sampleWithout(stream, names.length, methods).map((i) =>
      centredDifferencesOf(task, names[i]!),
    );
    const positions = drawPositions(seeds, chosen[0]!.length, stream);
    return chosen.map((differences) => pick(differences, positions));
  });
  return Array.from({ length: methods }, (_, method) => byTask.map((drawn) => drawn[method]!));
}
