import { describe, expect, it } from 'vitest';
import { expandedLevel } from '../../../results/statistics/expanded-level.js';

describe('expandedLevel', () => {
  it('expandedLevel(0.95, { values }) cuts the tails that Hesterberg 2015 gives: about 0.86 % of each with 10 values', () => {
    // α′/2 = Φ(−√(n/(n − 1)) t₀.₉₇₅,ₙ₋₁): √(10/9) · 2.262 = 2.385 of the printed tables, and Φ(−2.385) = 0.00855.
    expect((1 - expandedLevel(0.95, { values: 10 })) / 2).toBeCloseTo(0.00855, 4);
  });

  it('expandedLevel(level, { values }) approaches the level with many values, from above', () => {
    expect(expandedLevel(0.95, { values: 8 })).toBeGreaterThan(expandedLevel(0.95, { values: 32 }));
    expect(expandedLevel(0.95, { values: 1e6 })).toBeCloseTo(0.95, 5);
  });

  it('expandedLevel(level, { values, tasks }) counts a degree of freedom for each task', () => {
    // √(32/28) · t₀.₉₇₅(28) = 1.0690 · 2.0484 of the printed tables = 2.1898; 2 Φ(2.1898) − 1 = 0.9715.
    expect(expandedLevel(0.95, { values: 32, tasks: 4 })).toBeCloseTo(0.9715, 4);
  });

  it('expandedLevel(level, sample) refuses as many tasks as values', () => {
    expect(() => expandedLevel(0.95, { values: 4, tasks: 4 })).toThrow(
      'values must be a whole number of at least 5',
    );
  });
});
