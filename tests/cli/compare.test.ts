import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Comparison } from '../../results/comparison.js';
import { readCsv } from '../../results/csv.js';
import { onebatch } from './program.js';

const plan = [
  'seeds: 8',
  'pool: 150',
  'batch: 8',
  'tasks: [recipe, { task: ising, as: tag, settings: { length: 6 } }]',
  'curtains: [{ ceiling: 0.5, thin: 60, noise: 0.1 }]',
];

let root: string;

const compare = (...words: string[]) => onebatch(root, ['compare', ...words]);
const read = (...path: string[]) => readFile(join(root, ...path), 'utf8');
const compareAs = async (...words: string[]) =>
  JSON.parse((await compare(...words, '--format', 'json')).stdout) as Comparison;

beforeAll(async () => {
  root = await mkdtemp(join(tmpdir(), 'onebatch-compare-'));
  const rehearse = async (name: string, ...lines: string[]) => {
    await writeFile(join(root, `${name}.yaml`), [...plan, ...lines].join('\n'));
    expect((await onebatch(root, ['rehearse', `${name}.yaml`, '--out', name])).code).toBe(0);
  };
  await rehearse('run', 'methods: [repeat-best, jitter, additive]');
  await rehearse('more', 'methods: [jitter, { method: jitter, as: bold, settings: { step: 0.3 } }]');
  await rehearse('else', 'seed: 2', 'methods: [jitter]');
  await mkdir(join(root, 'empty'));
  const [header] = (await read('run', 'ledger.csv')).split('\n');
  await writeFile(join(root, 'empty', 'ledger.csv'), `${header}\n`);
});

afterAll(() => rm(root, { recursive: true }));

describe('onebatch compare LEDGER…', () => {
  test('says the same as the rehearsal did at its end', async () => {
    const { code, stdout } = await compare('run', '--format', 'json');
    expect(code).toBe(0);
    expect(JSON.parse(stdout)).toEqual(JSON.parse(await read('run', 'comparison.json')));
  });

  test('shows for each task and for all: difference, p, verdict, wins, rank and share', async () => {
    const { stdout } = await compare('run');
    expect(stdout.match(/^method +difference \[95 %\] +p +verdict +w\/t\/l .*beat visible$/gm)).toHaveLength(
      3,
    );
    expect(stdout).toMatch(/^jitter .* 16\/0\/0 |^jitter .*helps/m);
    expect(stdout).toMatch(/^rank: mean over 2 tasks/m);
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(100);
  });

  test('takes the ledger file for its folder', async () => {
    expect((await compare(join('run', 'ledger.csv'))).stdout).toBe((await compare('run')).stdout);
  });

  test('holds methods against the one named, by the score and margin named', async () => {
    const { against, sections } = await compareAs(
      'run',
      '--against',
      'jitter',
      '--score',
      'median',
      '--margin',
      '.3',
    );
    expect(against).toMatchObject({ method: 'jitter', score: 'median', margin: 0.3 });
    expect(sections[0]!.reference!.methods.map(({ method }) => method).sort()).toEqual([
      'additive',
      'repeat-best',
    ]);
  });

  test('compares several ledgers as one', async () => {
    const { sections } = await compareAs('run', 'more');
    expect(sections[0]!.methods.map(({ method }) => method).sort()).toEqual([
      'additive',
      'bold',
      'jitter',
      'repeat-best',
    ]);
  });

  test('gives CSV that can be read, a row a method and the best visible design, for each task and over all', async () => {
    const [head, ...lines] = await readCsv((await compare('run', '--format', 'csv')).stdout);
    expect(lines).toHaveLength(12);
    expect(lines.every((line) => line.length === head!.length)).toBe(true);
  });

  test.each([
    ['markdown', /^\| method \|/m],
    ['latex', /\\begin\{tabular\}/],
  ])('gives %s', async (format, sign) => {
    expect((await compare('run', '--format', format)).stdout).toMatch(sign);
  });

  test('writes all formats into the folder named', async () => {
    expect((await compare('run', '--out', join('deep', 'both'))).code).toBe(0);
    expect((await readdir(join(root, 'deep', 'both'))).sort()).toEqual([
      'comparison.csv',
      'comparison.json',
      'comparison.md',
      'comparison.tex',
    ]);
  });
});

describe('onebatch compare gives one clear line and exit code 2 for', () => {
  test.each<[string, string[], string]>([
    ['no ledger', [], 'name a ledger: the folder that a rehearsal wrote'],
    [
      'a folder that is not there',
      ['runn'],
      'runn: there is no such ledger; name a folder that a rehearsal wrote',
    ],
    ['a file that is no ledger', ['run.yaml'], 'run.yaml: is no ledger; name a folder or its ledger.csv'],
    ['an empty ledger', ['empty'], 'the ledger holds no finished cell, so there is nothing to compare'],
    [
      'a reference that is not there',
      ['run', '--against', 'jiter'],
      '--against: the ledger holds no method "jiter"; did you mean "jitter"?',
    ],
    ['a margin of 0', ['run', '--margin', '0'], '--margin: is "0", must be a number above 0, such as 0.02'],
    ['a margin in words', ['run', '--margin', 'small'], '--margin: is "small", must be a number above 0'],
    [
      'an unknown score',
      ['run', '--score', 'mean'],
      '--score: is "mean"; did you mean "median"? There is: best, median, lift',
    ],
    ['an unknown format', ['run', '--format', 'excel'], '--format: is "excel"; there is: terminal'],
    ['an empty folder name', ['run', '--out', ''], '--out: is empty; name a folder'],
    ['a folder that can not be made', ['run', '--out', 'run.yaml/x'], '--out: run.yaml/x can'],
    ['ledgers that disagree', ['run', 'else'], 'disagree on jitter'],
  ])('%s', async (_, words, line) => {
    const { code, stderr } = await compare(...words);
    expect(code).toBe(2);
    expect(stderr.toLowerCase()).toContain(line.toLowerCase());
    expect(stderr.trimEnd()).not.toContain('\n');
  });
});
