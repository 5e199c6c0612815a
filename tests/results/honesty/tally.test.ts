import { describe, expect, it } from 'vitest';
import { addTallies, countHits, isKept, monteCarloError, type Promised } from '../../honesty/tally.js';

const atMost: Promised = { kind: 'at most', share: 0.05 };
const between: Promised = { kind: 'between', low: 0.93, high: 0.97 };

describe('countHits', () => {
  it('countHits(trials, happens) asks once for each repetition', () => {
    const asked: number[] = [];
    const tally = countHits(4, (repetition) => asked.push(repetition) > 2);
    expect(asked).toEqual([0, 1, 2, 3]);
    expect(tally).toEqual({ hits: 2, trials: 4 });
  });

  it('addTallies(tallies) adds both counts', () => {
    const tallies = [
      { hits: 1, trials: 10 },
      { hits: 4, trials: 30 },
    ];
    expect(addTallies(tallies)).toEqual({ hits: 5, trials: 40 });
  });
});

describe('monteCarloError', () => {
  it('monteCarloError(tally) is √(p(1 − p)/n): 0.05 for 50 of 100, 0.0069 for 50 of 1,000', () => {
    expect(monteCarloError({ hits: 50, trials: 100 })).toBeCloseTo(0.05, 12);
    expect(monteCarloError({ hits: 50, trials: 1000 })).toBeCloseTo(0.00689, 5);
  });
});

describe('isKept', () => {
  it('isKept(tally, at most) is yes at the share, no far above it, and unsure just above', () => {
    expect(isKept({ hits: 50, trials: 1000 }, atMost)).toBe('yes');
    expect(isKept({ hits: 90, trials: 1000 }, atMost)).toBe('no');
    // Wilson's interval of 60 in 1,000 is 0.047 to 0.077 (statsmodels 0.13.5: proportion_confint).
    expect(isKept({ hits: 60, trials: 1000 }, atMost)).toBe('unsure');
  });

  it('isKept(tally, at least) mirrors it', () => {
    const atLeast: Promised = { kind: 'at least', share: 0.8 };
    expect(isKept({ hits: 810, trials: 1000 }, atLeast)).toBe('yes');
    expect(isKept({ hits: 790, trials: 1000 }, atLeast)).toBe('unsure');
    expect(isKept({ hits: 700, trials: 1000 }, atLeast)).toBe('no');
  });

  it('isKept(tally, between) refuses shares on either side', () => {
    expect(isKept({ hits: 950, trials: 1000 }, between)).toBe('yes');
    expect(isKept({ hits: 880, trials: 1000 }, between)).toBe('no');
    expect(isKept({ hits: 1000, trials: 1000 }, between)).toBe('no');
    expect(isKept({ hits: 925, trials: 1000 }, between)).toBe('unsure');
  });

  it('isKept(tally, nothing promised) says nothing', () => {
    expect(isKept({ hits: 1, trials: 2 }, null)).toBe('');
  });
});
