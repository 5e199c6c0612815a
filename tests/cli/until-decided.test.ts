import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Comparison } from '../../results/comparison.js';
import { type Ending, onebatch, signalAt } from './program.js';

// Jitter around recipes grown below a low ceiling finds better ones: common practice, and clear within a few rounds.
const plan = [
  'seeds: 6',
  'pool: 200',
  'batch: 8',
  'tasks: [recipe]',
  'curtains: [{ ceiling: 0.5, thin: 100 }]',
  'methods: [repeat-best, jitter]',
].join('\n');

let root: string;
let whole: Ending;

const rehearse = (...words: string[]) => onebatch(root, ['rehearse', ...words]);
const read = (...path: string[]) => readFile(join(root, ...path), 'utf8');
const comparisonIn = async (folder: string) =>
  JSON.parse(await read(folder, 'comparison.json')) as Comparison;

beforeAll(async () => {
  root = await mkdtemp(join(tmpdir(), 'onebatch-until-decided-'));
  await writeFile(join(root, 'plan.yaml'), plan);
  whole = await rehearse('plan.yaml', '--until-decided', '--most-seeds', '48', '--out', 'whole');
});

afterAll(() => rm(root, { recursive: true }));

describe('onebatch rehearse --until-decided', () => {
  test('adds rounds of seeds, and ends at the look that reaches every verdict', async () => {
    expect(whole.code).toBe(0);
    const { against, sections } = await comparisonIn('whole');
    const { planned, made } = against.looks!;
    expect(planned).toEqual([6, 12, 18, 24, 30, 36, 42, 48]);
    expect(made).toBeLessThan(planned.length);
    expect(sections[0]!.seeds).toBe(planned[made - 1]);
    expect(sections[0]!.reference!.methods).toMatchObject([{ verdict: 'helps', look: made }]);
  });

  test('tells each look as it goes, and how many were made at the end', async () => {
    const { made } = (await comparisonIn('whole')).against.looks!;
    expect(whole.stderr).toContain('Look 1 of 8, at 6 seeds: 0 of 1 verdicts reached.');
    expect(whole.stderr).toContain(`Look ${made} of 8, at ${6 * made} seeds: 1 of 1 verdicts reached.`);
    expect(whole.stdout.replace(/\s+/g, ' ')).toContain(`${made} looks of 8 planned`);
    for (const file of ['comparison.md', 'comparison.tex']) {
      expect((await read('whole', file)).replace(/\s+/g, ' ')).toContain(`${made} looks of 8 planned`);
    }
  });

  test('gone on with after an interruption, ends with the same bytes', async () => {
    const words = ['plan.yaml', '--until-decided', '--most-seeds', '48', '--out', 'cut'];
    const cut = await onebatch(root, ['rehearse', ...words], signalAt(join(root, 'cut'), 15, 'SIGINT'));
    expect(cut.code).toBe(130);
    expect((await rehearse(...words)).code).toBe(0);
    expect(await read('cut', 'ledger.csv')).toBe(await read('whole', 'ledger.csv'));
  });

  test('holds verdicts of an interrupted ledger to the looks that it allows', async () => {
    const words = ['plan.yaml', '--until-decided', '--most-seeds', '48', '--out', 'half'];
    await onebatch(root, ['rehearse', ...words], signalAt(join(root, 'half'), 14, 'SIGKILL'));
    const compared = await onebatch(root, ['compare', 'half', '--format', 'json']);
    const { against, sections } = JSON.parse(compared.stdout) as Comparison;
    const whole = Math.min(...sections[0]!.methods.map(({ cells }) => cells));
    expect(against.looks!.made).toBe(Math.floor(whole / 6));
  });

  test('is not mixed with ledgers of a fixed number of seeds', async () => {
    await rehearse('plan.yaml', '--out', 'fixed');
    const compared = await onebatch(root, ['compare', 'whole', 'fixed']);
    expect(compared.code).toBe(2);
    expect(compared.stderr).toContain('one was rehearsed until decided and the other was not');
  });
});
