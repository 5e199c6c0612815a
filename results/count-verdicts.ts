import type { Comparison } from './comparison.js';

/** How many verdicts a comparison's tables ask for, and how many of them are reached. */
export function countVerdicts({ sections, overall }: Pick<Comparison, 'sections' | 'overall'>): {
  readonly reached: number;
  readonly all: number;
} {
  const verdicts = [...sections, ...(overall === null ? [] : [overall])].flatMap(
    ({ reference }) => reference?.methods.map(({ verdict }) => verdict) ?? [],
  );
  return { reached: verdicts.filter((verdict) => verdict !== 'undecided').length, all: verdicts.length };
}
