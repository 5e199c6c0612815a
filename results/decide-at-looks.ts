import type { Stream } from '../harness/random.js';
import { type TaskPairs, testTaskDifferences } from './paired.js';
import type { SectionCells } from './scores.js';
import { type LookEvidence, type SequentialVerdict, sequentialRule } from './sequential.js';
import { SignPatterns } from './statistics/sign-flip.js';

/** Looks at verdicts while seeds were added. */
export interface Looks {
  /** Numbers of seeds after which a look was planned, ascending; the last is the most seeds. */
  readonly planned: readonly number[];
  /** How many of them have been made, from the first on. */
  readonly made: number;
}

/** Sign patterns drawn at a look: early looks need p values below what fewer can show. */
const flips = 100_000;

/**
 * Verdicts of several methods on the same tasks, held to looks at growing numbers of seeds: see `sequentialRule`. What
 * lies beyond the last look made does not count. All undecided before the first look.
 *
 * @param methods for each method its paired differences by task; each task holds the seeds 1 … n of every look made.
 * @param options.margin largest difference without practical meaning.
 * @param options.alpha family-wise level over methods and looks.
 */
export function decideAtLooks(
  methods: readonly (readonly TaskPairs[])[],
  { planned, made }: Looks,
  options: { readonly margin: number; readonly alpha: number; readonly stream: Stream },
): SequentialVerdict[] {
  if (made === 0) return methods.map(() => ({ verdict: 'undecided' }));
  const stream = options.stream.split('looks');
  const patterns = new SignPatterns(stream, flips);
  const most = planned.at(-1)!;
  const rule = sequentialRule({ information: planned.map((seeds) => seeds / most), alpha: options.alpha });
  const look = (tasks: readonly TaskPairs[], seeds: number): LookEvidence => {
    const differences = tasks.map((task) => task.differences.filter((_, i) => task.seeds[i]! <= seeds));
    const { p, mean, equivalenceP } = testTaskDifferences(differences, {
      margin: options.margin,
      stream,
      patterns,
    });
    return { p, difference: mean, equivalenceP };
  };
  return rule(methods.map((tasks) => planned.slice(0, made).map((seeds) => look(tasks, seeds))));
}

/** How many looks a ledger allows: those at numbers of seeds that all its methods have on all tasks. */
export function countLooks(sections: readonly SectionCells[], planned: readonly number[]): number {
  const whole = (seeds: number) =>
    sections.every(({ methods }) =>
      methods.every(({ rows }) => rows.filter(({ seed }) => seed <= seeds).length === seeds),
    );
  const missing = planned.findIndex((seeds) => !whole(seeds));
  return missing < 0 ? planned.length : missing;
}
