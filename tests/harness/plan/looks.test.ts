import fc from 'fast-check';
import { expect, test } from 'vitest';
import { mostLooks, planLooks } from '../../../harness/plan/looks.js';

test('planLooks(8, 64) looks after every round of 8 seeds', () => {
  expect(planLooks(8, 64)).toEqual([8, 16, 24, 32, 40, 48, 56, 64]);
});

test('the last look is at the most seeds, even where no round ends there', () => {
  expect(planLooks(8, 20)).toEqual([8, 16, 20]);
  expect(planLooks(8, 8)).toEqual([8]);
});

test('looks rise to the most seeds, by whole rounds, and are never more than 20', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 500 }), fc.integer({ min: 0, max: 50_000 }), (first, more) => {
      const looks = planLooks(first, first + more);
      expect(looks.length).toBeLessThanOrEqual(mostLooks);
      expect(looks.at(-1)).toBe(first + more);
      expect(looks.slice(0, -1).every((seeds) => seeds % first === 0)).toBe(true);
      expect(looks.every((seeds, i) => i === 0 || seeds > looks[i - 1]!)).toBe(true);
    }),
  );
});

test('fewer seeds in all than in a round are refused', () => {
  expect(() => planLooks(8, 7)).toThrow(RangeError);
});
