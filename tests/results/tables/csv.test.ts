import { parseString } from 'fast-csv';
import { describe, expect, it } from 'vitest';
import { compareRows } from '../../../results/comparison.js';
import { renderCsv } from '../../../results/tables/csv.js';
import { makeRow } from '../made-ledger.js';
import { smallComparison } from './small-comparison.js';

function readCsv(text: string): Promise<Record<string, string>[]> {
  return new Promise((resolve, reject) => {
    const rows: Record<string, string>[] = [];
    parseString(text, { headers: true })
      .on('error', reject)
      .on('data', (row) => rows.push(row))
      .on('end', () => resolve(rows));
  });
}

describe('renderCsv(comparison)', () => {
  it('has one line for best visible and one for each method, by task and over all tasks', async () => {
    const rows = await readCsv(await renderCsv(smallComparison));
    expect(rows.map(({ scope, task, row, method }) => [scope, task, row, method].join('; '))).toEqual([
      'task; hartmann-6; best visible; ',
      'task; hartmann-6; method; careful',
      'task; hartmann-6; method; naive',
      'task; nk(20, 3); best visible; ',
      'task; nk(20, 3); method; careful',
      'task; nk(20, 3); method; naive',
      'all tasks; ; best visible; ',
      'all tasks; ; method; careful',
      'all tasks; ; method; naive',
    ]);
  });

  it('keeps every number to its last digit, and says what made its interval', async () => {
    const rows = await readCsv(await renderCsv(smallComparison));
    const [, , naive] = rows;
    const scores = smallComparison.sections[0]!.methods[1]!;
    expect(naive).toMatchObject({
      best: String(scores.best.value),
      bestLow: String(scores.best.interval!.low),
      bestHigh: String(scores.best.interval!.high),
      bestInterval: 'student-t',
      bestCells: '3',
      optimismCells: '2',
      cells: '3',
      failures: '1',
      seconds: '2',
      level: '0.95',
      top: 'published',
      version: '0.1.0',
    });
    const overall = smallComparison.overall!.methods[0]!;
    expect(Number(rows[7]!['bestInterquartile'])).toBe(overall.best.interquartileMean.value);
    expect(Number(rows[7]!['medianInterquartileHigh'])).toBe(overall.median.interquartileMean.interval!.high);
  });

  it('leaves empty what is not known', async () => {
    const one = compareRows([makeRow({ method: 'a', seed: 0 })], { version: '0.1.0' });
    const [, method] = await readCsv(await renderCsv(one));
    expect(method).toMatchObject({ bestLow: '', bestInterval: 'none', optimism: '', seconds: '' });
  });

  it('gives labels with commas, quotes and line breaks back as they were', async () => {
    const labels = ['a,b', 'say "yes"', 'two\nlines', '=1+1', 'grün|材料'];
    const rows = labels.map((method) => makeRow({ method, seed: 0, task: 't, "1"' }));
    const read = await readCsv(await renderCsv(compareRows(rows, { version: '0.1.0' })));
    expect(read.slice(1).map(({ method }) => method)).toEqual(expect.arrayContaining(labels));
    expect(new Set(read.map(({ task }) => task))).toEqual(new Set(['t, "1"']));
  });

  it('has as many fields in each line as in its header, and ends with a line break', async () => {
    const text = await renderCsv(compareRows([makeRow({ method: 'a', seed: 0 })], { version: '0.1.0' }));
    const widths = text
      .trimEnd()
      .split('\n')
      .map((line) => line.split(',').length);
    expect(new Set(widths).size).toBe(1);
    expect(text.endsWith('\n')).toBe(true);
  });
});
