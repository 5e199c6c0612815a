import { z } from 'zod';
import { matrixFromRows } from '../harness/designs.js';
import { OnebatchError } from '../harness/errors.js';
import { sequenceSpace } from '../harness/space.js';
import { defineTaskFamily, type Task } from '../harness/task.js';
import { exactWorkLimit, maximizeFactors } from './factors/elimination.js';
import { type FactorSum, scoreFactors } from './factors/factor-sum.js';
import { lettersOf } from './factors/letters.js';

/** What the letters at two sites are worth together. */
export interface Coupling {
  readonly sites: readonly [number, number];
  /** alphabet² numbers; index = letter at the first site · alphabet + letter at the second. */
  readonly table: ArrayLike<number>;
}

/** A sequence score made of single sites and pairs of sites, written out. */
export interface PairScore {
  /** For each site, what each letter is worth there: alphabet numbers. */
  readonly fields: readonly ArrayLike<number>[];
  readonly couplings: readonly Coupling[];
  /** The alphabet, 2 … 256 letters. */
  readonly letters: readonly string[];
}

/**
 * The task of a pair score: the sum of all fields and couplings at the design's letters (minus the energy of an Ising
 * 1925 or Potts 1952 model), larger is better. The optimum is exact, by elimination (`maximizeFactors`), whatever it
 * costs: keep the couplings short-ranged.
 */
export function pairScoreTask({ fields, couplings, letters }: PairScore): Task {
  const sum: FactorSum = {
    sites: fields.length,
    alphabet: letters.length,
    factors: [...fields.map((table, site) => ({ sites: [site], table })), ...couplings],
  };
  const truth: Task['truth'] = (designs) => scoreFactors(sum, designs);
  const design = maximizeFactors(sum, Number.POSITIVE_INFINITY)!;
  return {
    space: sequenceSpace(fields.length, letters),
    truth,
    optimum: { value: truth(matrixFromRows([design]))[0]!, design, known: 'exact' },
  };
}

/** Open chains with Gaussian fields and couplings, drawn anew for every seed. */
export const ising = defineTaskFamily({
  name: 'ising',
  description: 'sequence scored by fields at its sites and couplings between near sites, all Gaussian',
  source: 'Ising 1925; Potts 1952',
  settings: z.strictObject({
    length: z.int().min(2).max(2000).default(20).describe('sites of the sequence'),
    alphabet: z.int().min(2).max(20).default(4).describe('letters a site can take'),
    range: z
      .int()
      .min(1)
      .default(1)
      .describe('how far couplings reach along the chain, in sites; at most length − 1'),
    couplingScale: z
      .number()
      .min(0)
      .max(1000)
      .default(1)
      .describe('standard deviation of the couplings; the fields have 1'),
  }),
  make({ length, alphabet, range, couplingScale }, stream) {
    if (range >= length) {
      throw new OnebatchError(
        'bad-settings',
        `ising: range must be at most length − 1 = ${length - 1}, got ${range}; lower range or raise length`,
      );
    }
    const work = length * (range + 2) * alphabet ** (range + 1);
    if (work > exactWorkLimit) {
      throw new OnebatchError(
        'bad-settings',
        `ising: the exact optimum would take length·(range + 2)·alphabet^(range + 1) = ${work.toPrecision(2)} table look-ups, more than ${exactWorkLimit}; lower range, alphabet or length`,
      );
    }
    const fieldStream = stream.split('fields');
    const couplingStream = stream.split('couplings');
    const couplings: Coupling[] = [];
    for (let first = 0; first < length; first++) {
      for (let second = first + 1; second <= Math.min(first + range, length - 1); second++) {
        couplings.push({
          sites: [first, second],
          table: Float64Array.from({ length: alphabet ** 2 }, () => couplingScale * couplingStream.normal()),
        });
      }
    }
    return pairScoreTask({
      fields: Array.from({ length }, () =>
        Float64Array.from({ length: alphabet }, () => fieldStream.normal()),
      ),
      couplings,
      letters: lettersOf(alphabet),
    });
  },
});
