import { wilsonInterval } from '../../results/statistics/wilson.js';

/** How often something happened. */
export interface Tally {
  readonly hits: number;
  readonly trials: number;
}

/** What a share is promised to be, as a share of 1; `null` where nothing is promised and the share stands for itself. */
export type Promised =
  | { readonly kind: 'at most'; readonly share: number }
  | { readonly kind: 'at least'; readonly share: number }
  | { readonly kind: 'between'; readonly low: number; readonly high: number }
  | null;

/** Counts how many of `trials` repetitions come true. */
export function countHits(trials: number, happens: (repetition: number) => boolean): Tally {
  let hits = 0;
  for (let repetition = 0; repetition < trials; repetition++) if (happens(repetition)) hits++;
  return { hits, trials };
}

/** All counts together. */
export function addTallies(tallies: readonly Tally[]): Tally {
  return {
    hits: tallies.reduce((sum, { hits }) => sum + hits, 0),
    trials: tallies.reduce((sum, { trials }) => sum + trials, 0),
  };
}

/** √(p(1 − p)/trials) of the share p: what repeating the simulation with another seed would scatter by. */
export function monteCarloError({ hits, trials }: Tally): number {
  const share = hits / trials;
  return Math.sqrt((share * (1 - share)) / trials);
}

/**
 * Whether a promise is kept: `yes`, `no`, or `unsure` where the share lies on the wrong side, but its Monte-Carlo
 * interval (95 %, Wilson 1927) reaches the right one.
 */
export function isKept({ hits, trials }: Tally, promised: Promised): 'yes' | 'no' | 'unsure' | '' {
  if (promised === null) return '';
  const share = hits / trials;
  const { low, high } = wilsonInterval({ successes: hits, trials });
  const least =
    promised.kind === 'between' ? promised.low : promised.kind === 'at least' ? promised.share : 0;
  const most = promised.kind === 'between' ? promised.high : promised.kind === 'at most' ? promised.share : 1;
  if (share >= least && share <= most) return 'yes';
  return high >= least && low <= most ? 'unsure' : 'no';
}
