import { describe, expect, test } from 'vitest';
import type { Interval } from '../../results/estimate.js';
import {
  adjustAndDecide,
  countSeedsNeeded,
  type Evidence,
  smallestAdjustedP,
} from '../../results/verdict.js';

const interval = (low: number, high: number): Interval => ({ low, high, level: 0.95, method: 'student-t' });

/** Evidence of ten pairs on one task. */
const evidence = (parts: Partial<Evidence>): Evidence => ({
  tasks: 1,
  n: 10,
  mean: 0.1,
  standardDeviation: 0.05,
  interval: interval(0.06, 0.14),
  p: 0.001,
  equivalenceP: 1,
  ...parts,
});

const wordsOf = (tests: readonly Evidence[]) =>
  adjustAndDecide(tests, { margin: 0.02 }).map(({ verdict }) => verdict);

describe('adjustAndDecide(tests, { margin })', () => {
  test('says helps, hurts, no real difference or undecided', () => {
    expect(
      wordsOf([
        evidence({}),
        evidence({ mean: -0.1, interval: interval(-0.14, -0.06) }),
        evidence({ mean: 0.001, interval: interval(-0.004, 0.006), p: 0.7, equivalenceP: 1e-4 }),
        evidence({ mean: 0.03, interval: interval(-0.02, 0.08), p: 0.2, equivalenceP: 0.7 }),
      ]),
    ).toEqual(['helps', 'hurts', 'no real difference', 'undecided']);
  });

  test('corrects by Holm: rejects the first and last of p = .01, .04, .03, .005', () => {
    // Holm 1979's procedure worked on these four (tests/reference/statistics.json, multiple_comparison).
    const decided = adjustAndDecide(
      [0.01, 0.04, 0.03, 0.005].map((p) => evidence({ p })),
      { margin: 0.02 },
    );
    expect(decided.map(({ adjustedP }) => adjustedP)).toEqual([
      expect.closeTo(0.03, 12),
      expect.closeTo(0.06, 12),
      expect.closeTo(0.06, 12),
      expect.closeTo(0.02, 12),
    ]);
    expect(decided.map(({ verdict }) => verdict)).toEqual(['helps', 'undecided', 'undecided', 'helps']);
  });

  test('an interval that holds 0 keeps a small p from a verdict', () => {
    expect(wordsOf([evidence({ interval: interval(-0.001, 0.2) })])).toEqual(['undecided']);
    expect(wordsOf([evidence({ interval: null })])).toEqual(['undecided']);
  });

  test('a difference that is shown and smaller than the margin still helps', () => {
    expect(wordsOf([evidence({ mean: 0.01, interval: interval(0.005, 0.015), equivalenceP: 1e-6 })])).toEqual(
      ['helps'],
    );
  });

  test('asks for seeds only where it is undecided', () => {
    const [helps, open] = adjustAndDecide(
      [evidence({}), evidence({ mean: 0.03, p: 0.3, interval: interval(-0.01, 0.07) })],
      { margin: 0.02 },
    );
    expect(helps!.seedsNeeded).toBeNull();
    expect(open!.seedsNeeded).toMatchObject({ kind: 'about' });
  });
});

describe('countSeedsNeeded(evidence, plan)', () => {
  const plan = { margin: 0.02, alpha: 0.05, tests: 1 };

  test('asks for 34 pairs of effect size one half at 80 % power', () => {
    // Cohen 1988, table 2.4.1, and statsmodels TTestPower: 33.37 pairs for d = .5, two-sided .05, power .80 (from memory).
    expect(countSeedsNeeded(evidence({ mean: 0.1, standardDeviation: 0.2 }), plan)).toEqual({
      kind: 'about',
      seeds: 34,
    });
  });

  test('spreads the pairs over tasks', () => {
    const spread = evidence({ mean: 0.1, standardDeviation: 0.2, tasks: 4, n: 8 });
    expect(countSeedsNeeded(spread, plan)).toEqual({ kind: 'about', seeds: 9 });
  });

  test('never asks for fewer than one more than there are', () => {
    expect(countSeedsNeeded(evidence({ n: 60, standardDeviation: 0.2 }), plan)).toMatchObject({ seeds: 61 });
  });

  test('asks for as many pairs as a sign-flip test needs to reach the level', () => {
    // Two-sided p of n equal signs is 2^(1 − n): below 0.05 from 6 pairs on, below 0.05 / 9 from 9 on.
    const certain = evidence({ n: 2, mean: 0.3, standardDeviation: 0 });
    expect(countSeedsNeeded(certain, plan)).toMatchObject({ seeds: 6 });
    expect(countSeedsNeeded(certain, { ...plan, tests: 9 })).toMatchObject({ seeds: 9 });
    expect(smallestAdjustedP(9, 9)).toBeLessThan(0.05);
    expect(smallestAdjustedP(8, 9)).toBeGreaterThan(0.05);
  });

  test('says more than 10,000, or unknown where one pair tells nothing of the spread', () => {
    expect(countSeedsNeeded(evidence({ mean: 0.02, standardDeviation: 9 }), plan).kind).toBe('more-than');
    expect(countSeedsNeeded(evidence({ standardDeviation: null }), plan)).toEqual({ kind: 'unknown' });
  });
});
