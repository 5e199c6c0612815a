import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Comparison } from '../../results/comparison.js';
import { type Ending, onebatch } from './program.js';

const plan = (on: string): string =>
  [
    'seeds: 4',
    'pool: 100',
    'batch: 4',
    'tasks: [branin, recipe, { task: ising, settings: { length: 6 } }]',
    'curtains: [{ ceiling: 0.6, thin: 40 }]',
    'methods:',
    '  - repeat-best',
    '  - { method: jitter, as: shaken, sweep: { step: [0.02, 0.3], parents: [1, 5] } }',
    `choose: { on: ${on} }`,
  ].join('\n');

const labels = [
  'shaken(step=0.02,parents=1)',
  'shaken(step=0.02,parents=5)',
  'shaken(step=0.3,parents=1)',
  'shaken(step=0.3,parents=5)',
];

let root: string;
let rehearsed: Ending;

const read = (...path: string[]) => readFile(join(root, ...path), 'utf8');
const parse = (text: string) => JSON.parse(text) as Comparison;
const words = (text: string): string => text.replace(/\s+/g, ' ');

/** The ledger's cells as the program wrote them: task, method, seed and best. */
async function cellsOf(folder: string) {
  const [, ...lines] = (await read(folder, 'ledger.csv')).trimEnd().split('\n');
  return lines.map((line) => {
    const [, task, method, seed, best] =
      /^([^,"]+|"[^"]+"),[^,]+,([^,"]+|"[^"]+"),[0-9a-f]{8},(\d+),done,,([^,]+),/.exec(line)!;
    return { task: task!, method: method!.replaceAll('"', ''), seed: Number(seed), best: Number(best) };
  });
}

beforeAll(async () => {
  root = await mkdtemp(join(tmpdir(), 'onebatch-sweep-'));
  await writeFile(join(root, 'seeds.yaml'), plan('seeds'));
  await writeFile(join(root, 'tasks.yaml'), plan('tasks'));
  rehearsed = await onebatch(root, ['rehearse', 'seeds.yaml', '--out', 'seeds', '--workers', '1']);
});

afterAll(() => rm(root, { recursive: true }));

describe('onebatch rehearse with a sweep', () => {
  test('runs every variant on every seed', async () => {
    expect(rehearsed.code).toBe(0);
    const cells = await cellsOf('seeds');
    expect(cells).toHaveLength(3 * 4 * 5);
    expect([...new Set(cells.map(({ method }) => method))]).toEqual(['repeat-best', ...labels]);
  });

  test('reports the variant that is best on the even seeds, by its scores on the odd ones', async () => {
    const cells = await cellsOf('seeds');
    const sum = (label: string, parity: number): number =>
      cells
        .filter(({ method, seed }) => method === label && seed % 2 === parity)
        .reduce((total, { best }) => total + best, 0);
    const winner = labels.reduce((best, label) => (sum(label, 0) > sum(best, 0) ? label : best));
    const { sweeps, overall, sections } = parse(await read('seeds', 'comparison.json'));
    expect(sweeps!.choices).toMatchObject([{ method: 'shaken', variants: 4, variant: winner, cells: 6 }]);
    expect(sweeps!.choices[0]!.score).toBeCloseTo(sum(winner, 0) / 6, 12);
    const shaken = overall!.methods.find(({ method }) => method === 'shaken')!;
    expect(shaken.best.mean.value).toBeCloseTo(sum(winner, 1) / 6, 12);
    expect(overall!.methods.map(({ method }) => method).sort()).toEqual(['repeat-best', 'shaken']);
    expect(sections.map(({ seeds }) => seeds)).toEqual([2, 2, 2]);
    expect(words(rehearsed.stdout)).toContain(
      'Tables report the odd seeds only, on which no settings were chosen.',
    );
  });

  test('keeps the sweep in the manifest, so that compare chooses again from the ledger', async () => {
    const compared = await onebatch(root, ['compare', 'seeds', '--format', 'json']);
    expect(parse(compared.stdout).sweeps).toEqual(parse(await read('seeds', 'comparison.json')).sweeps);
  });

  test('on the same cells only when asked, and marked then', async () => {
    const again = await onebatch(root, ['rehearse', 'seeds.yaml', '--out', 'seeds', '--same-cells']);
    expect(again.stderr).toContain('All 60 cells are in seeds already.');
    const caution =
      'CAUTION: the settings of shaken were chosen among 4 on the very cells reported here, so its scores are too high';
    expect(words(again.stdout)).toContain(caution);
    const compared = await onebatch(root, ['compare', 'seeds', '--same-cells', '--format', 'markdown']);
    expect(compared.stdout).toContain(caution);
  });

  test('chooses on some tasks and reports on the others, where the plan says so', async () => {
    await onebatch(root, ['rehearse', 'tasks.yaml', '--out', 'tasks', '--workers', '1']);
    const { sweeps, sections } = parse(await read('tasks', 'comparison.json'));
    expect(sweeps).toMatchObject({ on: 'tasks', choosingTasks: ['recipe'], choices: [{ cells: 4 }] });
    expect(sections.map(({ task, seeds }) => [task, seeds])).toEqual([
      ['branin', 4],
      ['ising(length=6)', 4],
    ]);
    expect(await read('tasks', 'ledger.csv')).toBe(await read('seeds', 'ledger.csv'));
  });
});
