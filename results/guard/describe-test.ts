import { formatDifference, formatP, formatScore } from '../format-number.js';
import type { SeedsNeeded } from '../verdict.js';
import { countOf } from './list-words.js';
import { guardLevel, type LossTest } from './test-losses.js';

/** What a test came to, in one sentence that can stand alone. */
export function describeTest(test: LossTest, margin: number): string {
  const { method, outcome, pairs } = test;
  const where = `${method} on ${placeName(test)}`;
  const pair = countOf(pairs, 'pair');
  const sentences: Record<LossTest['outcome'], string> = {
    regression: `${where} lost ${lossWithInterval(test)}: p ${formatP(test.lossP)} against no loss, and a loss of ${margin} is not ruled out (p ${formatP(test.marginP)}); ${pair}`,
    'small loss': `${where} lost ${lossWithInterval(test)}: a loss is shown (p ${formatP(test.lossP)}), and that it is less than ${margin} (p ${formatP(test.marginP)}); ${pair}`,
    'no regression': `${where} did not lose as much as ${margin} (p ${formatP(test.marginP)}): difference ${differenceWithInterval(test)}; ${pair}`,
    unchanged: `${where} has the same score in ${pairs === 1 ? 'its only pair' : `each of ${pair}`}`,
    'none shown': `${where}: no loss shown (p ${formatP(test.lossP)}), though one of ${margin} would have been with ${chance(test.power)}: difference ${differenceWithInterval(test)}; ${pair}`,
    'too few seeds': `${where}: too few seeds to show a loss of ${margin}, which ${pair} would have shown with ${chance(test.power)}${seedsHint(test.seedsNeeded)}: difference ${differenceWithInterval(test)}`,
  };
  const { before, after } = test.failures;
  const failed = before === 0 && after === 0 ? '' : `; ${after} of ${pairs} cells failed, before ${before}`;
  return sentences[outcome] + failed;
}

/** A task and its curtain, or all tasks. */
export function placeName({ place }: Pick<LossTest, 'place'>): string {
  return place === null ? 'all tasks' : `${place.task} (${place.curtain})`;
}

/** Candidate minus baseline, as in "-0.050 [-0.069, -0.031]". */
export function differenceWithInterval({ difference, interval }: LossTest): string {
  const bounds =
    interval === null ? '' : ` [${formatDifference(interval.low)}, ${formatDifference(interval.high)}]`;
  return `${formatDifference(difference)}${bounds}`;
}

/** A chance in whole percent, with 1 % and 99 % as the ends where it isn't certain. */
export function formatChance(power: number): string {
  if (power === 0 || power === 1) return `${100 * power} %`;
  return `${Math.min(99, Math.max(1, Math.round(100 * power)))} %`;
}

/** A number of seeds that would do, as in "40" or ">10000". */
export function formatSeedsNeeded(needed: SeedsNeeded): string {
  if (needed.kind === 'unknown') return '?';
  return needed.kind === 'more-than' ? `>${needed.seeds}` : String(needed.seeds);
}

function lossWithInterval({ difference, interval }: LossTest): string {
  const percent = Math.round(100 * guardLevel);
  const bounds =
    interval === null
      ? ''
      : `, ${percent} % interval [${formatScore(-interval.high)}, ${formatScore(-interval.low)}]`;
  return `${formatScore(-difference)}${bounds}`;
}

function chance(power: number | null): string {
  return power === null ? 'an unknown chance' : `${formatChance(power)} chance`;
}

function seedsHint(needed: SeedsNeeded | null): string {
  if (needed === null || needed.kind === 'unknown') return '';
  return needed.kind === 'about'
    ? `, and about ${needed.seeds} seeds with 80 %`
    : `, and only more than ${needed.seeds} seeds with 80 %`;
}
