import normal from '@stdlib/stats-base-dists-normal';
import { spendingBounds } from './statistics/alpha-spending.js';

/** What a look at the data so far says of one method against the reference. */
export interface LookEvidence {
  /** Two-sided p of the paired difference. */
  readonly p: number;
  /** Mean paired difference. */
  readonly difference: number;
  /** p of the two one-sided tests within the margin. */
  readonly equivalenceP: number;
}

/** What was decided of a method, and at which look, from 1 on. */
export type SequentialVerdict =
  | { readonly verdict: 'helps' | 'hurts' | 'no real difference'; readonly look: number }
  | { readonly verdict: 'undecided' };

export interface SequentialOptions {
  /** Share of all data that is in at each look, rising to at most 1; there may be more looks than evidence so far. */
  readonly information: readonly number[];
  /** Family-wise level over methods and looks; 0.05 unless given. */
  readonly alpha?: number;
}

/** Verdicts of several methods from their evidence, one array a method, one entry a look, the same number for all. */
export type SequentialRule = (evidence: readonly (readonly LookEvidence[])[]) => SequentialVerdict[];

/**
 * A rule for verdicts under repeated looks at growing data. Each look spends a part of the level by the O'Brien-Fleming
 * type function (Lan & DeMets 1983), and several methods are judged by Holm's procedure with such bounds in place of
 * levels (Ye, Li, Liu & Yao 2013; Maurer & Bretz 2013): as long as m methods are not told from the reference, each is
 * held to the bounds of alpha / m. So the chance of any wrong *helps* or *hurts* stays at `alpha`, however often one
 * looks and whatever makes one stop; that of any wrong *no real difference* likewise, as a family of its own.
 *
 * Assumes p values from sums of independent pairs, nearly normal at the looks that decide. A verdict once reached stays.
 *
 * The rule throws RangeError when methods differ in their number of looks, or there are more of them than `information`
 * holds.
 *
 * @throws RangeError for no look, shares that don't rise within (0, 1], or a level outside (0, 1).
 */
export function sequentialRule({ information, alpha = 0.05 }: SequentialOptions): SequentialRule {
  const levels = levelKeeper(information, alpha);
  levels(1, 'one-sided');
  return (evidence) => {
    const looks = evidence[0]?.length ?? 0;
    if (evidence.some((looked) => looked.length !== looks))
      throw new RangeError('methods differ in their number of looks');
    if (looks > information.length)
      throw new RangeError(`${looks} looks, but information for ${information.length}`);
    const verdicts: SequentialVerdict[] = evidence.map(() => ({ verdict: 'undecided' }));
    const different = new Set<number>();
    const alike = new Set<number>();
    for (let look = 0; look < looks; look++) {
      const now = evidence.map((looked) => looked[look]!);
      rejectStepwise(now, different, ({ p }, open) => p <= 2 * levels(open, 'two-sided')[look]!);
      rejectStepwise(
        now,
        alike,
        ({ equivalenceP }, open) => equivalenceP <= levels(open, 'one-sided')[look]!,
      );
      now.forEach(({ difference }, method) => {
        if (verdicts[method]!.verdict !== 'undecided') return;
        if (different.has(method)) {
          verdicts[method] = { verdict: difference > 0 ? 'helps' : 'hurts', look: look + 1 };
        } else if (alike.has(method)) {
          verdicts[method] = { verdict: 'no real difference', look: look + 1 };
        }
      });
    }
    return verdicts;
  };
}

/** Rejects hypotheses for as long as one passes the bound that goes with the number still open. */
function rejectStepwise(
  evidence: readonly LookEvidence[],
  rejected: Set<number>,
  passes: (evidence: LookEvidence, open: number) => boolean,
): void {
  for (;;) {
    const open = evidence.length - rejected.size;
    const next = evidence.findIndex((entry, method) => !rejected.has(method) && passes(entry, open));
    if (next < 0) return;
    rejected.add(next);
  }
}

/** Nominal levels worked out before, which takes longer than all else of a rule. */
const known = new Map<string, number[]>();

/** One-sided nominal levels of each look when `open` hypotheses share alpha; each worked out once. */
function levelKeeper(information: readonly number[], alpha: number) {
  return (open: number, sides: 'one-sided' | 'two-sided'): number[] => {
    const shares = open * (sides === 'two-sided' ? 2 : 1);
    const key = JSON.stringify([information, alpha, shares]);
    const levels =
      known.get(key) ?? spendingBounds(information, alpha / shares).map((bound) => normal.cdf(-bound, 0, 1));
    known.set(key, levels);
    return levels;
  };
}
