import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { compareRows } from '../../results/comparison.js';
import { makeRow } from './made-ledger.js';

// Demšar 2006, "Statistical comparisons of classifiers over multiple data sets", table 6: four learners on 14 data sets.
const { demsar_2006: worked } = JSON.parse(
  readFileSync(new URL('../reference/statistics.json', import.meta.url), 'utf8'),
) as {
  demsar_2006: {
    algorithms: string[];
    datasets: string[];
    auc: number[][];
    published_ranks: number[][];
    published: { 'CD_0.05': number };
    computed_from_published_ranks: { average_ranks: number[]; F_F: number; df: number[]; p_F: number };
  };
};

/** Every learner on every data set, its score standing for its published rank. */
const rows = worked.datasets.flatMap((task, i) =>
  worked.algorithms.map((method, j) =>
    makeRow({ task, method, seed: 1, best: 1 - worked.published_ranks[i]![j]! / 10, bestVisible: 0.1 }),
  ),
);

describe('ranks of a comparison', () => {
  const ranks = compareRows(rows, { version: '0.1.0' }).overall!.ranks!;

  test("are those of Demšar's worked example, with its F and critical difference", () => {
    const expected = worked.computed_from_published_ranks;
    for (const [j, method] of worked.algorithms.entries()) {
      const found = ranks.methods.find((it) => it.method === method)!;
      expect(found.meanRank).toBeCloseTo(expected.average_ranks[j]!, 12);
    }
    expect(ranks.F).toBeCloseTo(expected.F_F, 9);
    expect(ranks.degreesOfFreedom).toEqual(expected.df);
    expect(ranks.p).toBeCloseTo(expected.p_F, 9);
    expect(ranks.criticalDifference).toBeCloseTo(worked.published['CD_0.05'], 2);
  });

  test('group all four at the 5 % level, as the paper concludes', () => {
    expect(ranks.groups.map((group) => [...group].sort())).toEqual([[...worked.algorithms].sort()]);
    expect(ranks.tooFewTasks).toBe(false);
  });

  test('leave out a method that lacks a task, and say so', () => {
    const lacking = rows.filter(({ task, method }) => task !== 'wine' || method !== 'C4.5');
    const found = compareRows(lacking, { version: '0.1.0' }).overall!.ranks!;
    expect(found.leftOut).toEqual(['C4.5']);
    expect(found.methods).toHaveLength(3);
  });

  test('are absent with a single task or method', () => {
    expect(compareRows(rows.slice(0, 4), { version: '0.1.0' }).overall).toBeNull();
    const alone = rows.filter(({ method }) => method === 'C4.5');
    expect(compareRows(alone, { version: '0.1.0' }).overall!.ranks).toBeNull();
  });
});
