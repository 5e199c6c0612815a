import { mkdir, readdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import type { Verdict } from '../../harness/judge.js';
import type { Kept } from '../../harness/plan/plan.js';
import { makeSpace } from '../../harness/space.js';
import { keepsakeFolder, writeKeepsakes } from '../../results/keepsakes.js';
import { makeRow } from './made-ledger.js';
import { withFolder } from './temporary-folder.js';

const space = makeSpace([
  { kind: 'continuous', name: 'dial', low: 0, high: 10 },
  { kind: 'integer', name: 'count', low: 1, high: 5 },
  { kind: 'category', name: 'kind, of leaf', levels: ['red', 'deep green'] },
]);
const designs = matrixFromRows([
  [0.1, 2, 1],
  [10, 5, 0],
]);
const row = makeRow({ method: 'jitter', seed: 7 });
const full: Verdict = {
  row,
  batch: {
    proposal: { designs },
    truth: Float64Array.of(0.25, 1 / 3),
    believed: Float64Array.of(1, 2),
    spread: Float64Array.of(0.5, 0),
  },
  trace: [
    { step: 0, believed: Float64Array.of(0, 1), truth: Float64Array.of(0.5, 0.75) },
    { step: 10, believed: Float64Array.of(2), truth: Float64Array.of(0.125) },
  ],
};

/** The files that were written, by their name's end. */
function written(kept: readonly Kept[], verdict: Verdict): Promise<Record<string, string>> {
  return withFolder(async (folder) => {
    const cells = join(folder, keepsakeFolder);
    await mkdir(cells);
    await writeKeepsakes(folder, kept, space, verdict);
    const names = (await readdir(cells)).sort();
    const files = names.map(async (name) => {
      expect(name).toMatch(/^hartmann-6_jitter_7_[0-9a-f]{8}\.(batch|trace)\.csv$/);
      return [name.replace(/^[^.]+\./, ''), await readFile(join(cells, name), 'utf8')] as const;
    });
    return Object.fromEntries(await Promise.all(files));
  });
}

describe('writeKeepsakes', () => {
  test("writes a batch in the space's own values and levels, with truth, belief and spread", async () => {
    expect(await written(['batches'], full)).toEqual({
      'batch.csv': [
        'dial,count,"kind, of leaf",true_score,believed,spread',
        '0.1,2,deep green,0.25,1,0.5',
        '10,5,red,0.3333333333333333,2,0',
        '',
      ].join('\n'),
    });
  });

  test('leaves belief and spread empty where the method said none', async () => {
    const { believed: _, spread: __, ...plain } = full.batch!;
    const files = await written(['batches'], { row, batch: plain });
    expect(files['batch.csv']!.split('\n').slice(1)).toEqual([
      '0.1,2,deep green,0.25,,',
      '10,5,red,0.3333333333333333,,',
      '',
    ]);
  });

  test('writes belief and truth of every design along the climb', async () => {
    expect(await written(['traces'], full)).toEqual({
      'trace.csv': 'step,design,believed,true_score\n0,1,0,0.5\n0,2,1,0.75\n10,1,2,0.125\n',
    });
  });

  test('writes both, and only what the plan asks for', async () => {
    expect(Object.keys(await written(['traces', 'batches'], full))).toEqual(['batch.csv', 'trace.csv']);
    expect(await written([], full)).toEqual({});
  });

  test('writes nothing for a cell that failed', async () => {
    expect(await written(['batches', 'traces'], { row: { ...row, status: 'failed' } })).toEqual({});
  });

  test('writes cells that differ in curtain or settings alone to files of their own', () =>
    withFolder(async (folder) => {
      await mkdir(join(folder, keepsakeFolder));
      const others = [row, { ...row, curtain: 'open' }, { ...row, settings: '11111111' }];
      for (const other of others) await writeKeepsakes(folder, ['batches'], space, { ...full, row: other });
      expect(await readdir(join(folder, keepsakeFolder))).toHaveLength(3);
    }));
});
