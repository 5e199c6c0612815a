import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { rootStream } from '../../harness/random.js';
import { countOutcomes, pairRows, testTaskDifferences } from '../../results/paired.js';
import { makeRow } from './made-ledger.js';

const published = JSON.parse(
  readFileSync(new URL('../reference/statistics.json', import.meta.url), 'utf8'),
) as {
  equivalence: {
    x: number[];
    y: number[];
    margin: number;
    paired_tost: { p: number };
    paired_non_inferiority_H1_mean_diff_gt_minus_margin: { p: number };
  };
  paired_permutation_exact: { hollander_wolfe_depression: { difference: number[]; p_two_sided: number } };
};
const options = { margin: 0.02, stream: rootStream(1) };

describe('pairRows(candidate, reference, score)', () => {
  const rows = (method: string, bests: Record<number, number>, task = 'hill') =>
    Object.entries(bests).map(([seed, best]) => makeRow({ method, task, seed: Number(seed), best }));

  test('takes differences seed by seed, whatever the order of rows, and counts cells without a partner', () => {
    const [pairs, ...others] = pairRows(
      rows('a', { 1: 0.5, 2: 0.75, 4: 1 }).reverse(),
      rows('b', { 1: 0.25, 2: 0.25, 3: 0.9 }),
      'best',
    );
    expect(others).toEqual([]);
    expect(pairs).toMatchObject({ task: 'hill', seeds: [1, 2], differences: [0.25, 0.5], unpaired: 2 });
  });

  test('leaves out tasks without a seed in common', () => {
    const a = [...rows('a', { 1: 0.5 }), ...rows('a', { 1: 0.5 }, 'dale')];
    const b = [...rows('b', { 2: 0.5 }), ...rows('b', { 1: 0.5 }, 'dale')];
    expect(pairRows(a, b, 'best').map(({ task }) => task)).toEqual(['dale']);
  });

  test('takes the score asked for', () => {
    const a = [makeRow({ method: 'a', seed: 1, median: 0.5, best: 0.9 })];
    const b = [makeRow({ method: 'b', seed: 1, median: 0.25, best: 0.9 })];
    expect(pairRows(a, b, 'median')[0]!.differences).toEqual([0.25]);
    expect(pairRows(a, b, 'lift')[0]!.differences).toEqual([0]);
  });

  test('refuses two rows for one seed', () => {
    const a = rows('a', { 1: 0.5 });
    expect(() => pairRows([...a, ...a], a, 'best')).toThrow(RangeError);
  });
});

describe('testTaskDifferences(tasks, { margin })', () => {
  test('gives the published exact p of sign flips', () => {
    const { difference, p_two_sided } = published.paired_permutation_exact.hollander_wolfe_depression;
    const { p, test: name } = testTaskDifferences([difference], options);
    expect(name).toBe('sign-flip-exact');
    expect(p).toBeCloseTo(p_two_sided, 12);
  });

  test("gives statsmodels' p of two one-sided paired t tests, and of non-inferiority", () => {
    const {
      x,
      y,
      margin,
      paired_tost,
      paired_non_inferiority_H1_mean_diff_gt_minus_margin: inferior,
    } = published.equivalence;
    const tested = testTaskDifferences([x.map((value, i) => value - y[i]!)], { ...options, margin });
    expect(tested.equivalenceP).toBeCloseTo(paired_tost.p, 10);
    expect(tested.nonInferiorityP).toBeCloseTo(inferior.p, 10);
  });

  test('weighs tasks the same, however many pairs they have', () => {
    const { mean, n, tasks } = testTaskDifferences([[0.1, 0.1, 0.1, 0.1], [0.3]], options);
    expect(mean).toBeCloseTo(0.2, 12);
    expect([n, tasks]).toEqual([5, 2]);
  });

  test('cannot tell the spread of a single pair, and shows nothing with it', () => {
    const { interval, standardDeviation, p, equivalenceP } = testTaskDifferences([[0.3]], options);
    expect([interval, standardDeviation, p, equivalenceP]).toEqual([null, null, 1, 1]);
  });

  test('takes equal differences within the margin for sameness by the sign test', () => {
    expect(testTaskDifferences([[0, 0, 0, 0, 0]], options).equivalenceP).toBe(2 ** -5);
    expect(testTaskDifferences([[0.5, 0.5, 0.5]], options).equivalenceP).toBe(1);
  });

  test('refuses a margin that is not above 0', () => {
    expect(() => testTaskDifferences([[0.1, 0.2]], { ...options, margin: 0 })).toThrow(RangeError);
  });
});

test('countOutcomes counts what lies on the margin as a tie', () => {
  expect(countOutcomes([0.5, 0.25, 0, -0.25, -0.5, 1], 0.25)).toEqual({ wins: 2, ties: 3, losses: 1 });
});
