import { describe, expect, test } from 'vitest';
import { compareRows } from '../../../results/comparison.js';
import { chooseSettings } from '../../../results/sweep.js';
import { tableFormats } from '../../../results/tables/index.js';
import { renderTerminal } from '../../../results/tables/terminal.js';
import { makeRow } from '../made-ledger.js';

const tasks = ['s', 't'];
const variants = ['firm(target=0.5)', 'firm(target=1)', 'firm(target=2)'];
const rows = tasks.flatMap((task) =>
  ['idle', ...variants].flatMap((method, i) =>
    [1, 2, 3, 4].map((seed) => makeRow({ task, method, seed, best: 0.5 + i / 10 })),
  ),
);
const plan = {
  on: 'seeds' as const,
  tasks,
  sweeps: [{ method: 'firm', variants: variants.map((label) => ({ label, settings: '00000000' })) }],
};

/** A comparison by halves or on the same cells, in every format, its markup and line breaks taken out. */
async function render(sameCells: boolean): Promise<[string, string][]> {
  const chosen = chooseSettings(rows, plan, { seconds: new Map(), score: 'best', sameCells });
  const comparison = compareRows(chosen.rows, { version: '0.1.0', resamples: 50, sweeps: chosen.sweeps });
  const files = tableFormats.map(
    async ({ name, render: write }): Promise<[string, string]> => [name, await write(comparison)],
  );
  const texts: [string, string][] = [['terminal', renderTerminal(comparison)], ...(await Promise.all(files))];
  return texts.map(([name, text]) => [name, text.replace(/\\(?=\W)/g, '').replace(/\s+/g, ' ')]);
}

const count = (text: string, part: string): number => text.split(part).length - 1;

describe('every format', () => {
  test('says how settings were chosen, and that the other half alone is reported', async () => {
    for (const [name, text] of await render(false)) {
      expect(text, name).toContain('firm(target=2)');
      expect(text, name).not.toContain('firm(target=1)');
      expect(text, name).not.toContain('CAUTION');
      if (name === 'csv') continue;
      expect(text, name).toContain(
        'Settings of firm: chosen among 3 by mean best on the even seeds (4 cells each)',
      );
      expect(text, name).toContain('Tables report the odd seeds only, on which no settings were chosen.');
    }
  });

  test('is marked where settings were chosen on the very cells reported', async () => {
    for (const [name, text] of await render(true)) {
      expect(text, name).toContain('CAUTION');
      if (name === 'csv') continue;
      expect(text, name).toContain(
        'CAUTION: the settings of firm were chosen among 3 on the very cells reported here, so its scores are too high: firm(target=2)',
      );
    }
  });

  test('marks each table of Markdown and LaTeX, which may be used alone, and each line of CSV about the method', async () => {
    const texts = new Map(await render(true));
    expect(count(texts.get('latex')!, 'CAUTION')).toBe(3);
    expect(count(texts.get('markdown')!, 'CAUTION')).toBe(4);
    expect(count(texts.get('csv')!, ',3,firm(target=2),CAUTION: same cells,')).toBe(3);
  });
});

test('a comparison without a sweep says nothing of choosing', () => {
  const plain = compareRows(
    rows.filter(({ method }) => method === 'idle'),
    { version: '0.1.0', resamples: 50 },
  );
  expect([plain.sweeps, plain.foot.sweeps]).toEqual([null, []]);
});
