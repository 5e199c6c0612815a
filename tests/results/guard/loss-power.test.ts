import { describe, expect, test } from 'vitest';
import { chanceToShow, seedsToShow } from '../../../results/guard/loss-power.js';

const design = { loss: 0.5, standardDeviation: 1, level: 0.05 };

describe('chanceToShow(pairs, design)', () => {
  test('is the power of the one-sided paired t test where the level holds many sign patterns', () => {
    // Cohen 1988, table 2.3.1 (one-sided .05, d = .5 of the differences): n = 26 pairs give 80 %; from memory.
    expect(chanceToShow(27, design)).toBeGreaterThanOrEqual(0.8);
    expect(chanceToShow(26, design)).toBeCloseTo(0.8, 1);
  });

  test('is 0 where no sign pattern is rare enough, and 1 without spread where one is', () => {
    expect(chanceToShow(4, design)).toBe(0);
    expect(chanceToShow(5, { ...design, standardDeviation: 0 })).toBe(1);
  });

  test('with a single pattern in the level, is the chance that all differences are negative', () => {
    // P(Z < 1)^5 for a loss of one deviation; P(Z < 1) = 0.84134 of the printed normal tables.
    expect(chanceToShow(5, { ...design, loss: 1 })).toBeCloseTo(0.841345 ** 5, 4);
  });
});

describe('seedsToShow(tasks, design)', () => {
  test('gives the fewest pairs with 80 % power, spread over the tasks', () => {
    const needed = seedsToShow(1, design);
    expect(needed).toMatchObject({ kind: 'about' });
    expect(chanceToShow(needed.kind === 'about' ? needed.seeds : 0, design)).toBeGreaterThanOrEqual(0.8);
    expect(seedsToShow(3, design)).toEqual({
      kind: 'about',
      seeds: Math.ceil((needed.kind === 'about' ? needed.seeds : 0) / 3),
    });
  });

  test('says more than 10,000 for a loss that is tiny beside the spread', () => {
    expect(seedsToShow(1, { ...design, loss: 0.001 })).toEqual({ kind: 'more-than', seeds: 10_000 });
  });
});
