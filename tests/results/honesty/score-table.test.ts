import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { catalogue } from '../../../cli/catalogue.js';
import { readPlan } from '../../../harness/plan/read.js';
import { parseScores, readScores, renderScores } from '../../honesty/score-table.js';
import { makeRow } from '../made-ledger.js';

describe('renderScores', () => {
  const row = (task: string, method: string, seed: number, best: number) =>
    makeRow({ task, method, seed, best });
  const streams = [
    [row('b', 'x', 2, 0.25), row('b', 'x', 1, 1 / 3), row('a', 'x', 1, -0.1), row('a', 'x', 2, 1)],
    [row('a', 'x', 1, 0.2), row('a', 'x', 2, 0.3), row('b', 'x', 1, 0.4), row('b', 'x', 2, 0.5)],
  ];

  it('renderScores(streams) writes a line for each task and seed, a column for each method and stream', () => {
    expect(renderScores(streams)).toBe(
      'task,seed,x#1,x#2\na,1,-0.10000,0.20000\na,2,1.00000,0.30000\nb,1,0.33333,0.40000\nb,2,0.25000,0.50000\n',
    );
  });

  it('parseScores(text) reads them back, streams beside one another', () => {
    const [a, b] = parseScores(renderScores(streams));
    expect(a).toMatchObject({ task: 'a', seeds: 2 });
    expect(a!.methods.get('x')).toEqual([Float64Array.of(-0.1, 1), Float64Array.of(0.2, 0.3)]);
    expect(b!.methods.get('x')![0]).toEqual(Float64Array.of(0.33333, 0.25));
  });

  it('renderScores(streams) orders ten streams by number', () => {
    const ten = Array.from({ length: 10 }, (_, stream) => [row('a', 'x', 1, stream / 10)]);
    expect(
      parseScores(renderScores(ten))[0]!
        .methods.get('x')!
        .map(([score]) => score),
    ).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9]);
  });
});

describe('the committed scores', () => {
  it('are those of the plan beside them: its tasks, methods and seeds, each with two streams at least', () => {
    const file = new URL('../../honesty/scores.plan.yaml', import.meta.url);
    const plan = readPlan(readFileSync(file, 'utf8'), 'scores.plan.yaml', catalogue);
    const scores = readScores();
    expect(scores.map(({ task }) => task)).toEqual(plan.tasks.map(({ label }) => label).sort());
    for (const { seeds, methods } of scores) {
      expect(seeds).toBe(plan.seeds);
      expect([...methods.keys()].sort()).toEqual(plan.methods.map(({ label }) => label).sort());
      for (const streams of methods.values()) {
        expect(streams.length).toBeGreaterThanOrEqual(2);
        expect(streams.every((values) => values.length === seeds && values.every(Number.isFinite))).toBe(
          true,
        );
      }
    }
  });
});
