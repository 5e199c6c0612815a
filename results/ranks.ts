import type { MethodScores, Section } from './section.js';
import { friedmanTest } from './statistics/friedman.js';
import { nemenyiDifference, nemenyiGroups } from './statistics/nemenyi.js';

/** How methods rank over tasks by their mean score. */
export interface Ranks {
  /** Pairs of task and curtain that were ranked. */
  readonly tasks: number;
  /** From the best mean rank to the worst; 1 is best, ties averaged. */
  readonly methods: readonly { readonly method: string; readonly meanRank: number }[];
  /** Methods that lack a task, and are left out. */
  readonly leftOut: readonly string[];
  /** Friedman's statistic, and Iman & Davenport's F of it; F is null where all tasks agree on all ranks. */
  readonly chiSquare: number;
  readonly F: number | null;
  readonly degreesOfFreedom: readonly [number, number];
  readonly p: number;
  /** Nemenyi's at the 5 % level: mean ranks that lie closer can't be told apart. */
  readonly criticalDifference: number;
  /** Largest groups that can't be told apart, each from its best rank on; they may overlap. */
  readonly groups: readonly (readonly string[])[];
  /** Whether even the best and the worst possible mean rank would lie closer than the critical difference. */
  readonly tooFewTasks: boolean;
}

/**
 * Mean ranks over tasks, Friedman's test and Nemenyi's critical difference (Demšar 2006). Null with fewer than two
 * tasks, or two methods that have cells on all of them.
 */
export function rankMethods(sections: readonly Section[], score: 'best' | 'median' | 'lift'): Ranks | null {
  const scored = sections.map(
    ({ methods }) => new Map<string, MethodScores>(methods.map((scores) => [scores.method, scores])),
  );
  const all = [...new Set(scored.flatMap((methods) => [...methods.keys()]))];
  const whole = all.filter((method) => scored.every((methods) => methods.has(method)));
  if (sections.length < 2 || whole.length < 2) return null;
  const table = scored.map((methods) => whole.map((method) => methods.get(method)![score].value));
  const { meanRanks, chiSquare, F, degreesOfFreedom, p } = friedmanTest(table);
  const { criticalDifference } = nemenyiDifference({ methods: whole.length, tasks: sections.length });
  const order = whole.map((_, i) => i).sort((a, b) => meanRanks[a]! - meanRanks[b]!);
  return {
    tasks: sections.length,
    methods: order.map((i) => ({ method: whole[i]!, meanRank: meanRanks[i]! })),
    leftOut: all.filter((method) => !whole.includes(method)),
    chiSquare,
    F: Number.isFinite(F) ? F : null,
    degreesOfFreedom,
    p,
    criticalDifference,
    groups: nemenyiGroups(meanRanks, criticalDifference).map((group) => group.map((i) => whole[i]!)),
    tooFewTasks: criticalDifference > whole.length - 1,
  };
}
