import { cp, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { XMLValidator } from 'fast-xml-parser';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { rootStream } from '../../harness/random.js';
import { readCsv, writeCsv } from '../../results/csv.js';
import { onebatch } from './program.js';

const plan = [
  'seeds: 16',
  'pool: 150',
  'batch: 8',
  'tasks: [branin, { task: ising, as: tag, settings: { length: 6 } }]',
  'curtains: [{ ceiling: 0.5, thin: 60, noise: 0.1 }]',
  'methods: [repeat-best, jitter, { method: additive, as: "sum(a,b)" }]',
].join('\n');

let root: string;

const guard = (...words: string[]) => onebatch(root, ['guard', ...words]);

beforeAll(async () => {
  root = await mkdtemp(join(tmpdir(), 'onebatch-guard-'));
  await writeFile(join(root, 'plan.yaml'), plan);
  await writeFile(join(root, 'chance.yaml'), `methodSeed: 2\n${plan}`);
  await writeFile(join(root, 'other.yaml'), plan.replace('pool: 150', 'pool: 151'));
  for (const [file, out] of [
    ['plan.yaml', 'before'],
    ['chance.yaml', 'chance'],
    ['other.yaml', 'other'],
  ] as const) {
    expect((await onebatch(root, ['rehearse', file, '--out', out])).code).toBe(0);
  }
});

afterAll(() => rm(root, { recursive: true }));

/** A copy of the baseline whose rows are changed, or left out where `change` gives nothing. */
async function changed(
  folder: string,
  change: (row: Record<string, string>) => Record<string, string> | undefined,
): Promise<string> {
  await cp(join(root, 'before'), join(root, folder), { recursive: true });
  const [columns = [], ...lines] = await readCsv(await readFile(join(root, 'before', 'ledger.csv'), 'utf8'));
  const rows = lines.flatMap((values) => {
    const row = Object.fromEntries(columns.map((column, i) => [column, values[i] ?? '']));
    const kept = change(row);
    return kept === undefined ? [] : [kept];
  });
  await writeFile(join(root, folder, 'ledger.csv'), await writeCsv(columns, rows));
  return folder;
}

/** The candidate's jitter lost 0.05 of its best on average, give or take 0.02. */
function worsened(folder: string): Promise<string> {
  const stream = rootStream(7);
  return changed(folder, (row) => {
    if (row['method'] !== 'jitter') return row;
    const loss = 0.05 + 0.02 * stream.normal();
    return { ...row, best: String(Number(row['best']) - loss), lift: String(Number(row['lift']) - loss) };
  });
}

describe('onebatch guard BASELINE CANDIDATE', () => {
  test('ends with 1 and names method, task, size and interval where a method lost 0.05 at 16 seeds', async () => {
    const { code, stdout } = await guard('before', await worsened('worse'));
    expect(code).toBe(1);
    expect(stdout).toMatch(
      /jitter on branin \(ceiling=0\.5 thin=60 noise=0\.1\) lost 0\.0[45]\d, 90 % interval \[0\.0\d\d, 0\.0\d\d\]/,
    );
    expect(stdout).toContain('jitter on tag');
    expect(stdout).toContain('Failed: 3 regressions found at a margin of 0.02');
  });

  test('ends with 0 where only the random numbers of methods changed', async () => {
    const { code, stdout } = await guard('before', 'chance');
    expect(code).toBe(0);
    expect(stdout).toContain('methodSeed: 1 in the baseline, 2 in the candidate');
    expect(stdout).toContain('Passed: no regression shown');
  });

  test('says where the data could not have shown such a loss, and fails then with --strict', async () => {
    const { code, stdout } = await guard('before', 'chance', '--margin', '0.001');
    expect([code, stdout.includes('too few seeds')]).toEqual([0, true]);
    const strict = await guard('before', 'chance', '--margin', '0.001', '--strict');
    expect([strict.code, strict.stdout.includes('Failed: no regression shown')]).toEqual([1, true]);
  });

  test('ends with 0 and says unchanged for the same ledger twice', async () => {
    const { code, stdout } = await guard('before', 'before', '--strict');
    expect(code).toBe(0);
    expect(stdout.match(/everywhere .*unchanged$/gm)).toHaveLength(3);
  });

  test('compares the methods asked for alone', async () => {
    const { code, stdout } = await guard('before', 'worse', '--methods', 'sum(a,b),repeat-best');
    expect(code).toBe(0);
    expect(stdout).not.toContain('jitter');
  });

  test('writes an XML report that is well formed', async () => {
    await guard('before', 'worse', '--junit', 'report.xml');
    const xml = await readFile(join(root, 'report.xml'), 'utf8');
    expect(XMLValidator.validate(xml)).toBe(true);
    expect(xml).toContain('<testsuites name="onebatch guard" tests="9" failures="3"');
    expect(xml).toContain('testcase name="sum(a,b)"');
  });

  test('writes the report also where the ledgers can not be paired', async () => {
    expect((await guard('before', 'other', '--junit', 'error.xml')).code).toBe(2);
    const xml = await readFile(join(root, 'error.xml'), 'utf8');
    expect(XMLValidator.validate(xml)).toBe(true);
    expect(xml).toContain('errors="1"');
  });
});

describe('onebatch guard gives one clear line and exit code 2', () => {
  test('for ledgers of different plans', async () => {
    const { code, stderr } = await guard('before', 'other');
    expect(code).toBe(2);
    expect(stderr).toBe(
      "before and other can't be paired, their plans differ (pool: 150 -> 151); rehearse the candidate with the baseline's plan\n",
    );
  });

  test('for a ledger that lacks cells', async () => {
    const lacking = await changed('lacking', (row) =>
      row['method'] === 'jitter' && row['seed'] === '3' ? undefined : row,
    );
    const { code, stderr } = await guard('before', lacking);
    expect(code).toBe(2);
    expect(stderr).toMatch(
      /^lacking lacks 2? ?.*seed.* of "jitter" on branin .*: 3; run its plan to the end\n$/,
    );
  });

  test('for a task that gives other instances', async () => {
    const moved = await changed('moved', (row) => ({ ...row, top: String(Number(row['top']) + 1) }));
    const { code, stderr } = await guard('before', moved);
    expect(code).toBe(2);
    expect(stderr).toContain('branin (ceiling=0.5 thin=60 noise=0.1) is not the same in both: for seed 1');
  });

  test.each<[string, string[], string]>([
    [
      'no such folder',
      ['before', 'nowhere'],
      'nowhere: there is no such ledger; name a folder that a rehearsal wrote',
    ],
    ['one folder', ['before'], 'Not enough non-option arguments: got 1, need at least 2'],
    [
      'a margin of 0',
      ['before', 'chance', '--margin', '0'],
      '--margin: is "0", must be a number above 0, such as 0.02',
    ],
    [
      'a method that is not there',
      ['before', 'chance', '--methods', 'jiter'],
      '--methods: before holds no method "jiter"; did you mean "jitter"?',
    ],
    [
      'a score that it can not compare',
      ['before', 'chance', '--score', 'lift'],
      '--score: is "lift"; there is',
    ],
    [
      'a report that can not be written',
      ['before', 'chance', '--junit', 'nowhere/report.xml'],
      "--junit: nowhere/report.xml can't be written (ENOENT)",
    ],
  ])('for %s', async (_, words, line) => {
    const { code, stderr } = await guard(...words);
    expect(code).toBe(2);
    expect(stderr.toLowerCase()).toContain(line.toLowerCase());
    expect(stderr.trimEnd()).not.toContain('\n');
  });
});
