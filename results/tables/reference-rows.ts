import type { Estimate, ShareEstimate } from '../estimate.js';
import type { OverallScores } from '../overall.js';
import type { Ranks } from '../ranks.js';
import type { AgainstReference, ReferenceBlock } from '../reference.js';
import type { MethodScores } from '../section.js';

/** One line of a table against the reference. */
export interface ReferenceRow {
  readonly method: string;
  /** Whether this is the reference itself, whose difference is nothing to test. */
  readonly isReference: boolean;
  /** Null for the reference, and for a method that shares no seed with it. */
  readonly against: AgainstReference | null;
  readonly beatVisible: ShareEstimate;
  /** Null where methods are not ranked. */
  readonly meanRank: number | null;
}

/** All methods against the reference, from the largest difference to the smallest, the reference at 0. */
export function referenceRows(
  block: ReferenceBlock,
  scores: readonly (MethodScores | OverallScores)[],
  ranks: Ranks | null = null,
): ReferenceRow[] {
  const tested = new Map(block.methods.map((against) => [against.method, against]));
  const ranked = new Map(ranks?.methods.map(({ method, meanRank }) => [method, meanRank]));
  const rows = scores.map(({ method, beatVisible }) => ({
    method,
    isReference: method === block.method,
    against: tested.get(method) ?? null,
    beatVisible,
    meanRank: ranked.get(method) ?? null,
  }));
  return rows.sort((a, b) => differenceOf(b) - differenceOf(a));
}

function differenceOf({ isReference, against }: ReferenceRow): number {
  if (isReference) return 0;
  return against?.difference.value ?? -Number.MAX_VALUE;
}

/** The difference of a row; null where there is none. */
export function estimateOf({ against }: ReferenceRow): Estimate | null {
  return against?.difference ?? null;
}
