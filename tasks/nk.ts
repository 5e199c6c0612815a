import { z } from 'zod';
import { matrixFromRows } from '../harness/designs.js';
import { OnebatchError } from '../harness/errors.js';
import { type Stream, sampleWithout } from '../harness/random.js';
import { sequenceSpace } from '../harness/space.js';
import { defineTaskFamily, type Task } from '../harness/task.js';
import { maximizeFactors } from './factors/elimination.js';
import { type FactorSum, scoreFactors } from './factors/factor-sum.js';
import { climbFactors } from './factors/iterated-climb.js';
import { lettersOf } from './factors/letters.js';

/** All sites' tables together hold at most this many numbers. */
const tableLimit = 5_000_000;

/** An NK landscape, written out. */
export interface NkLandscape {
  /** For each of N sites, the K other sites that its contribution depends on. */
  readonly neighbours: readonly (readonly number[])[];
  /**
   * For each site, its contribution for every combination of letters of itself and its neighbours: alphabet^(K+1)
   * numbers, the site's own letter the most significant digit, then the neighbours in their order.
   */
  readonly tables: readonly ArrayLike<number>[];
  /** The alphabet, 2 … 256 letters. */
  readonly letters: readonly string[];
}

/**
 * The task of a landscape: fitness is the mean of the N contributions (Kauffman & Weinberger 1989), larger
 * is better. The optimum is `exact` where it can be computed by elimination (`maximizeFactors`) within its work limit,
 * which is always so for up to 4 letters and 4 adjacent interactions at 15 sites; else it is `best-known`, from an
 * iterated local search with `stream`.
 */
export function nkTask({ neighbours, tables, letters }: NkLandscape, stream: Stream): Task {
  const sites = neighbours.length;
  const sum: FactorSum = {
    sites,
    alphabet: letters.length,
    factors: neighbours.map((others, site) => ({ sites: [site, ...others], table: tables[site]! })),
  };
  const truth: Task['truth'] = (designs) => scoreFactors(sum, designs).map((total) => total / sites);
  const exact = maximizeFactors(sum);
  const design = exact ?? climbFactors(sum, stream);
  return {
    space: sequenceSpace(sites, letters),
    truth,
    optimum: {
      value: truth(matrixFromRows([design]))[0]!,
      design,
      known: exact === undefined ? 'best-known' : 'exact',
    },
  };
}

/** NK landscapes over sequences, with fresh tables (and random neighbours) for every seed. */
export const nk = defineTaskFamily({
  name: 'nk',
  description: 'NK landscape over a sequence: each site contributes by its own letter and K others',
  source: 'Kauffman & Levin 1987; Kauffman & Weinberger 1989',
  settings: z.strictObject({
    length: z.int().min(2).max(500).default(15).describe('sites N of the sequence'),
    interactions: z
      .int()
      .min(0)
      .default(2)
      .describe('other sites K that each contribution depends on, at most length − 1; more is more rugged'),
    alphabet: z.int().min(2).max(20).default(4).describe('letters a site can take'),
    neighbourhood: z
      .enum(['adjacent', 'random'])
      .default('adjacent')
      .describe('which sites interact: the next K (the last joins the first), or K drawn at random'),
  }),
  make({ length, interactions, alphabet, neighbourhood }, stream) {
    if (interactions >= length) {
      throw new OnebatchError(
        'bad-settings',
        `nk: interactions must be at most length − 1 = ${length - 1}, got ${interactions}; lower interactions or raise length`,
      );
    }
    const entries = alphabet ** (interactions + 1);
    if (length * entries > tableLimit) {
      throw new OnebatchError(
        'bad-settings',
        `nk: ${length} tables of ${alphabet}^${interactions + 1} numbers are more than ${tableLimit} in all; lower interactions, alphabet or length`,
      );
    }
    const wiring = stream.split('neighbours');
    const contributions = stream.split('tables');
    const sites = Array.from({ length }, (_, site) => site);
    return nkTask(
      {
        neighbours: sites.map((site) =>
          neighbourhood === 'adjacent'
            ? Array.from({ length: interactions }, (_, k) => (site + k + 1) % length)
            : drawOthers(site, length, interactions, wiring),
        ),
        tables: sites.map(() => Float64Array.from({ length: entries }, () => contributions.uniform())),
        letters: lettersOf(alphabet),
      },
      stream.split('search'),
    );
  },
});

function drawOthers(site: number, length: number, count: number, stream: Stream): number[] {
  return sampleWithout(stream, length - 1, count).map((other) => (other < site ? other : other + 1));
}
