import { describe, expect, test } from 'vitest';
import { cellsOf, countCells, settingsHash } from '../../harness/cells.js';
import { cellId } from '../../harness/row.js';
import { smallPlan, toyPlan } from './toy-plan.js';

describe('cellsOf', () => {
  const cells = [...cellsOf(smallPlan)];

  test('holds each task, curtain, method and seed exactly once', () => {
    const ids = cells.map(({ key }) => cellId(key));
    expect(new Set(ids).size).toBe(ids.length);
    const expected = [
      ['slope', 'ceiling=0.6'],
      ['blend', 'ceiling=0.5'],
      ['blend', 'thin=12 noise=0.1'],
    ].flatMap(([task, curtain]) =>
      ['scripted', 'idle-best', 'long'].flatMap((method) =>
        [1, 2, 3].map((seed) => [task, curtain, method, seed].join()),
      ),
    );
    const seen = cells.map(({ key }) => [key.task, key.curtain, key.method, key.seed].join());
    expect(seen.sort()).toEqual(expected.sort());
  });

  test('runs through all methods before the next seed, so that they can share a stage', () => {
    const stages = cells.map(({ key }) => `${key.task} ${key.curtain} ${key.seed}`);
    const changes = stages.filter((stage, i) => stage !== stages[i - 1]);
    expect(changes).toHaveLength(new Set(stages).size);
  });

  test('countCells counts them', () => {
    expect(countCells(smallPlan)).toBe(27);
    expect(cells).toHaveLength(27);
  });
});

describe('settingsHash', () => {
  const hashes = (...methods: string[]) =>
    toyPlan('tasks: [slope]', `methods: [${methods.join(', ')}]`).methods.map(settingsHash);

  test('is eight hexadecimal digits', () => {
    expect(hashes('scripted')[0]).toMatch(/^[0-9a-f]{8}$/);
  });

  test('is the same whether a default is written or left out, and whatever the label', () => {
    const [bare, written, labelled] = hashes(
      'scripted',
      '{ method: scripted, as: b, settings: { search: { steps: 10 } } }',
      '{ method: scripted, as: c, settings: { script: good } }',
    );
    expect(written).toBe(bare);
    expect(labelled).toBe(bare);
  });

  test('differs when a setting, the method or one of its parts differs', () => {
    const seen = hashes(
      'scripted',
      'idle-best',
      '{ method: scripted, as: b, settings: { search: { steps: 11 } } }',
      '{ surrogate: ridge, search: genetic }',
      '{ surrogate: ridge, search: genetic, caution: lower-bound }',
      '{ surrogate: network, search: genetic }',
    );
    expect(new Set(seen).size).toBe(seen.length);
  });
});
