import { appendFile, mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { readCsv } from '../../results/csv.js';
import { type Ending, onebatch, signalAt } from './program.js';

const network = '{ width: 32, steps: 300, batch: 32 }';
const tinyPlan = [
  'seeds: 3',
  'pool: 60',
  'batch: 4',
  'keep: [batches, traces]',
  'tasks: [branin, { task: ising, settings: { length: 6 } }]',
  'curtains: [{ ceiling: 0.5, noise: 0.1 }]',
  'methods:',
  '  - repeat-best',
  '  - jitter',
  `  - { method: gradient-ascent, settings: { surrogate: ${network}, search: { steps: 20 } } }`,
].join('\n');
const cells = 18;

let root: string;
/** The tiny plan carried out by one worker and by two, without interruption. */
let one: Ending;
let two: Ending;

const at = (...path: string[]) => join(root, ...path);
const rehearse = (...words: string[]) => onebatch(root, ['rehearse', ...words]);

/** Every file below a folder with its content, but for wall-clock times and what is made of them. */
async function contents(folder: string, all = false): Promise<Record<string, string>> {
  const names = (await readdir(at(folder), { recursive: true, withFileTypes: true }))
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name).slice(at(folder).length + 1))
    .filter((name) => all || !/^(timings|comparison)\./.test(name))
    .sort();
  return Object.fromEntries(
    await Promise.all(names.map(async (name) => [name, await readFile(at(folder, name), 'utf8')])),
  );
}

/** The whole lines of a CSV file in an output folder, but for its header. */
async function linesOf(folder: string, name: string): Promise<string[][]> {
  const text = await readFile(at(folder, name), 'utf8');
  return (await readCsv(text.slice(0, text.lastIndexOf('\n') + 1))).slice(1);
}

const ledgerOf = (folder: string) => linesOf(folder, 'ledger.csv');
const timingsOf = (folder: string) => linesOf(folder, 'timings.csv');
const idOf = (line: readonly string[]) => line.slice(0, 5).join('|');

beforeAll(async () => {
  root = await mkdtemp(join(tmpdir(), 'onebatch-test-'));
  await writeFile(at('tiny.plan.yaml'), tinyPlan);
  one = await rehearse('tiny.plan.yaml', '--workers', '1', '--out', 'one');
  two = await rehearse('tiny.plan.yaml', '--workers', '2', '--out', 'two');
});
afterAll(() => rm(root, { recursive: true, force: true }));

describe('a rehearsal', () => {
  test('ends with exit code 0 and a table within 100 columns', () => {
    expect([one.code, two.code]).toEqual([0, 0]);
    for (const words of [
      'branin',
      'ising(length=6)',
      'All tasks',
      'repeat-best',
      'jitter',
      'gradient-ascent',
    ]) {
      expect(one.stdout).toContain(words);
    }
    expect(Math.max(...one.stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(100);
  });

  test('tells how it goes on standard error in plain lines where that is no terminal', () => {
    expect(two.stderr).toMatch(
      /^Rehearsing "tiny": 18 cells, on 2 workers, into two\n(\d+\/18 cells, 0 failed, \d+ s left\n)*18\/18 cells, 0 failed, 0 s left\nDone in .+\.\n$/,
    );
  });

  test('writes the same bytes with one worker and with two: ledger, manifest, batches and traces', async () => {
    const [first, second] = [await contents('one'), await contents('two')];
    expect(Object.keys(first).filter((name) => name.endsWith('.batch.csv'))).toHaveLength(cells);
    expect(Object.keys(first).filter((name) => name.endsWith('.trace.csv'))).toHaveLength(cells / 3);
    expect(second).toEqual(first);
  });

  test("has every cell in its ledger once, in the plan's order", async () => {
    const rows = (await ledgerOf('one')).map(([task, , method, , seed, status]) =>
      [task, method, seed, status].join(),
    );
    expect(rows).toEqual(
      ['branin', 'ising(length=6)'].flatMap((task) =>
        ['repeat-best', 'jitter', 'gradient-ascent'].flatMap((method) =>
          [1, 2, 3].map((seed) => [task, method, seed, 'done'].join()),
        ),
      ),
    );
  });

  test('writes the comparison as CSV, Markdown and JSON', async () => {
    const files = await contents('one', true);
    for (const name of ['comparison.csv', 'comparison.md', 'comparison.json']) {
      expect(files[name]).toContain('gradient-ascent');
    }
    expect(() => JSON.parse(files['comparison.json']!)).not.toThrow();
  });

  test('that is finished is not done again: the same table, exit code and files', async () => {
    const before = await contents('one', true);
    const again = await rehearse('tiny.plan.yaml', '--workers', '2', '--out', 'one');
    expect(again).toEqual({ ...one, stderr: 'All 18 cells are in one already.\n' });
    expect(await contents('one', true)).toEqual(before);
  });
});

describe('an interrupted rehearsal', () => {
  const words = ['rehearse', 'tiny.plan.yaml', '--workers', '1', '--out', 'cut'];

  test('goes on after Ctrl-C and after kill -9 where it stopped, and ends as if nothing had happened', async () => {
    const interrupted = await onebatch(root, words, signalAt(at('cut'), 2, 'SIGINT'));
    const first = await ledgerOf('cut');
    expect(interrupted.code).toBe(130);
    expect(interrupted.stdout).toBe('');
    expect(interrupted.stderr).toContain(
      `\nInterrupted: ${first.length} of 18 cells are in cut; the same command goes on from there.\n`,
    );

    const killed = await onebatch(root, words, signalAt(at('cut'), first.length + 2, 'SIGKILL'));
    expect(killed.signal).toBe('SIGKILL');
    expect(killed.stderr).toContain(`18 cells, ${first.length} of them done before, on 1 worker, into cut\n`);
    const second = await ledgerOf('cut');
    expect(second.length).toBeGreaterThanOrEqual(first.length + 2);
    expect(second.length).toBeLessThan(cells);
    await appendFile(at('cut', 'ledger.csv'), 'branin,"ceili'); // a line that a power cut left half-written

    const ended = await onebatch(root, words);
    expect(ended.code).toBe(0);
    expect(ended.stderr).toContain(`18 cells, ${second.length} of them done before, on 1 worker, into cut\n`);
    expect(await contents('cut')).toEqual(await contents('one'));
    const timings = (await timingsOf('cut')).map(idOf);
    for (const line of second) expect(timings.filter((id) => id === idOf(line))).toHaveLength(1);
    expect(new Set(timings).size).toBe(cells);
  });
});

describe('a rehearsal with methods that fail', () => {
  const plan = [
    'seeds: 1',
    'pool: 60',
    'batch: 4',
    'budgetSeconds: 2',
    'tasks: [branin]',
    'methods:',
    '  - jitter',
    '  - { surrogate: network, search: gradient-ascent, caution: lower-bound, as: unfit }',
    '  - { method: gradient-ascent, as: slow, settings: { surrogate: { steps: 1000000 } } }',
    '  - repeat-best',
  ].join('\n');

  test('records the reasons, does the rest, and ends with exit code 3, again when it is run again', async () => {
    await writeFile(at('failing.plan.yaml'), plan);
    const words = ['failing.plan.yaml', '--workers', '2', '--out', 'failing'];
    const ending = await rehearse(...words);
    expect(ending.code).toBe(3);
    expect(ending.stderr).toContain('4/4 cells, 2 failed, 0 s left\n');
    const reasons = (await ledgerOf('failing')).map(([, , method, , , status, reason]) => [
      method,
      status,
      reason,
    ]);
    expect(reasons).toEqual([
      ['jitter', 'done', ''],
      [
        'unfit',
        'failed',
        'caution "lower-bound" needs a surrogate with a spread; "network" has none, use "network-ensemble"',
      ],
      ['slow', 'failed', 'took longer than its budget of 2 s'],
      ['repeat-best', 'done', ''],
    ]);
    const before = await contents('failing', true);
    expect(await rehearse(...words)).toEqual({ ...ending, stderr: 'All 4 cells are in failing already.\n' });
    expect(await contents('failing', true)).toEqual(before);
  });
});

describe('a rehearsal is refused with one clear line and exit code 2', () => {
  test('in the folder of another plan, saying what changed', async () => {
    const before = await contents('one', true);
    const ending = await rehearse('tiny.plan.yaml', '--out', 'one', '--seeds', '4');
    expect(ending).toEqual({
      code: 2,
      signal: null,
      stdout: '',
      stderr:
        'one holds a rehearsal of something else (plan.seeds: 3 -> 4); name a new folder with --out, or remove this one\n',
    });
    expect(await contents('one', true)).toEqual(before);
  });

  test('on a damaged ledger, saying the line', async () => {
    await mkdir(at('damaged'));
    for (const [name, text] of Object.entries(await contents('one', true)).filter(
      ([path]) => !path.includes('/'),
    )) {
      await writeFile(at('damaged', name), text.replace(',done,', ',dome,'));
    }
    const ending = await rehearse('tiny.plan.yaml', '--out', 'damaged');
    expect(ending).toMatchObject({
      code: 2,
      stderr: `${join('damaged', 'ledger.csv')}:2: column "status" holds "dome", which is not what belongs there; remove the line and run the plan again\n`,
    });
  });
});
