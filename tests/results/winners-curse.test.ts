import { expect, test } from 'vitest';
import { rootStream } from '../../harness/random.js';
import type { SweepPlan } from '../../results/sweep/sweep-plan.js';
import { chooseSettings } from '../../results/sweep.js';
import { makeRow } from './made-ledger.js';

const variants = 8;
const seeds = 4;
const tasks = ['s', 't'];
const truth = 0.6;
const spread = 0.1;
const rehearsals = 400;

const labels = Array.from({ length: variants }, (_, i) => `firm(${i + 1})`);
const sweeps = [{ method: 'firm', variants: labels.map((label) => ({ label, settings: '00000000' })) }];

/** Mean reported score minus the truth over many rehearsals of equally good variants, and its standard error. */
function biasOf(on: SweepPlan['on'], sameCells: boolean): { bias: number; standardError: number } {
  const stream = rootStream(7).split('equal variants', on, String(sameCells));
  const errors = Array.from({ length: rehearsals }, () => {
    const rows = tasks.flatMap((task) =>
      labels.flatMap((method) =>
        Array.from({ length: seeds }, (_, i) =>
          makeRow({ task, method, seed: i + 1, best: truth + spread * stream.normal() }),
        ),
      ),
    );
    const chosen = chooseSettings(
      rows,
      { on, tasks, sweeps },
      { seconds: new Map(), score: 'best', sameCells },
    );
    return chosen.rows.reduce((sum, { best }) => sum + best, 0) / chosen.rows.length - truth;
  });
  const bias = errors.reduce((sum, error) => sum + error, 0) / rehearsals;
  const variance = errors.reduce((sum, error) => sum + (error - bias) ** 2, 0) / (rehearsals - 1);
  return { bias, standardError: Math.sqrt(variance / rehearsals) };
}

/** Mean of the largest of 8 independent standard normal numbers (Teichroew 1956, table of normal order statistics). */
const largestOfEight = 1.4236;

test('settings chosen and reported on the same cells score too high, by the mean of the largest of 8 equals', () => {
  const { bias, standardError } = biasOf('seeds', true);
  const expected = (largestOfEight * spread) / Math.sqrt(seeds * tasks.length);
  expect(Math.abs(bias - expected)).toBeLessThan(4 * standardError);
  expect(bias).toBeGreaterThan(20 * standardError);
});

test.each(['seeds', 'tasks'] as const)(
  'settings chosen on one half of the %s and reported on the other do not (common practice: selection bias)',
  (on) => {
    const { bias, standardError } = biasOf(on, false);
    expect(Math.abs(bias)).toBeLessThan(4 * standardError);
    expect(standardError).toBeLessThan((largestOfEight * spread) / Math.sqrt(seeds * tasks.length) / 10);
  },
);
