import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../../harness/designs.js';
import { rootStream, sampleWithout } from '../../../harness/random.js';
import { maximizeFactors } from '../../../tasks/factors/elimination.js';
import { planElimination } from '../../../tasks/factors/elimination-plan.js';
import { type FactorSum, scoreFactors } from '../../../tasks/factors/factor-sum.js';
import { climbFactors } from '../../../tasks/factors/iterated-climb.js';
import { everySequence, largest } from '../sequences.js';

/** Factors over random sets of sites; some sites may be in none. */
function drawSum(seed: number, sites: number, alphabet: number, count: number): FactorSum {
  const stream = rootStream(seed);
  const factors = Array.from({ length: count }, () => {
    const scope = sampleWithout(stream, sites, 1 + stream.below(Math.min(4, sites)));
    return {
      sites: scope,
      table: Float64Array.from({ length: alphabet ** scope.length }, () => stream.normal()),
    };
  });
  return { sites, alphabet, factors };
}

const sums = fc
  .tuple(fc.nat(1e6), fc.integer({ min: 1, max: 6 }), fc.integer({ min: 2, max: 4 }), fc.nat(8))
  .map(([seed, sites, alphabet, count]) => drawSum(seed, sites, alphabet, count));

describe('maximizeFactors(sum)', () => {
  test('reaches the largest value met by trying every sequence', () => {
    fc.assert(
      fc.property(sums, (sum) => {
        const best = largest(scoreFactors(sum, everySequence(sum.sites, sum.alphabet)));
        const reached = scoreFactors(sum, matrixFromRows([maximizeFactors(sum)!]))[0]!;
        expect(Math.abs(reached - best)).toBeLessThan(1e-12);
      }),
      { numRuns: 150 },
    );
  });

  test('gives nothing rather than exceed its work limit', () => {
    const sum = drawSum(1, 6, 3, 12);
    expect(maximizeFactors(sum, 10)).toBeUndefined();
    expect(maximizeFactors(sum, 1e6)).toBeDefined();
  });
});

describe('planElimination(sites, alphabet, scopes, workLimit)', () => {
  const widest = (scopes: number[][], sites: number) =>
    Math.max(...planElimination(sites, 2, scopes, 1e9)!.map((step) => step.others.length));

  // Elementary treewidths: a path has 1, a cycle 2, a complete graph of n sites n − 1.
  test('holds one other site at a time on a chain, two on a ring, all others on a complete graph', () => {
    const sites = Array.from({ length: 9 }, (_, i) => i);
    const chain = sites.slice(1).map((i) => [i - 1, i]);
    expect(widest(chain, 9)).toBe(1);
    expect(widest([...chain, [8, 0]], 9)).toBe(2);
    expect(widest([sites], 9)).toBe(8);
  });

  test('holds 2K sites on a ring where each is tied to the next K', () => {
    const scopes = Array.from({ length: 20 }, (_, i) => [i, (i + 1) % 20, (i + 2) % 20, (i + 3) % 20]);
    expect(widest(scopes, 20)).toBe(6);
  });

  test('counts tables · alphabet^(1 + others) for every step against the limit', () => {
    const scopes = [[0], [0, 1], [1, 2]];
    // Site 0: tables [0] and [0,1], one other: 2·3²; site 1: [1,2] and the table left: 2·3²; site 2: 1·3.
    expect(planElimination(3, 3, scopes, 39)).toHaveLength(3);
    expect(planElimination(3, 3, scopes, 38)).toBeUndefined();
  });
});

describe('climbFactors(sum, stream, work)', () => {
  test('finds the exact maximum of small sums', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const sum = drawSum(seed, 12, 3, 24);
      const [exact, climbed] = scoreFactors(
        sum,
        matrixFromRows([maximizeFactors(sum)!, climbFactors(sum, rootStream(seed), 200_000)]),
      );
      expect(Math.abs(climbed! - exact!)).toBeLessThan(1e-12);
    }
  });

  test('is fixed by its stream', () => {
    const sum = drawSum(5, 40, 4, 90);
    expect(climbFactors(sum, rootStream(1), 50_000)).toEqual(climbFactors(sum, rootStream(1), 50_000));
  });

  test('ends at a sequence that no change of one letter improves', () => {
    const sum = drawSum(6, 60, 4, 150);
    const design = climbFactors(sum, rootStream(1), 100_000);
    const value = scoreFactors(sum, matrixFromRows([design]))[0]!;
    const changed = Array.from(design).flatMap((_, site) =>
      [0, 1, 2, 3].map((letter) => design.with(site, letter)),
    );
    expect(largest(scoreFactors(sum, matrixFromRows(changed)))).toBeLessThanOrEqual(value + 1e-9);
  });
});
