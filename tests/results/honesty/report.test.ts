import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { command, renderReport } from '../../honesty/report.js';
import { readScores } from '../../honesty/score-table.js';
import { studies } from '../../honesty/studies/index.js';
import type { Study } from '../../honesty/study.js';
import answer from '../../honesty/worker.js';

const read = (path: string) => readFileSync(new URL(`../../../${path}`, import.meta.url), 'utf8');

/** Every study with one repetition of everything. */
const smoke = Object.entries(studies).map(([name, study]) => ({
  study,
  findings: Array.from({ length: study.parts }, (_, part) =>
    answer({ study: name, part, seed: 1, effort: 1e-9 }),
  ).flat(),
}));

describe('renderReport', () => {
  const study: Study = {
    title: 'Coins',
    text: 'Coins are tossed.',
    columns: { row: ['coin'], share: 'heads', more: ['worst'] },
    parts: 2,
    run: () => [],
  };
  const findings = [
    {
      row: ['fair'],
      tally: { hits: 50, trials: 100 },
      promised: { kind: 'between', low: 0.4, high: 0.6 } as const,
      more: ['a'],
    },
    { row: ['bent'], tally: { hits: 90, trials: 100 }, promised: null, more: ['b'] },
  ];

  it('renderReport(studies) gives each share its Monte-Carlo error, and says what is promised and kept', () => {
    const text = renderReport([{ study, findings }], { scores: readScores(), seed: 4 });
    expect(text.slice(text.indexOf('## Coins'))).toMatchInlineSnapshot(`
      "## Coins

      Coins are tossed.

      | coin | heads | promised | kept | worst |
      | --- | --- | --- | --- | --- |
      | fair | 50.0 % ± 5.0 | 40 to 60 % | yes | a |
      | bent | 90.0 % ± 3.0 |  |  | b |
      "
    `);
    expect(text).toContain('`npm run honesty`, seed 4;');
  });
});

describe('the studies', () => {
  it('fill every column of their tables', () => {
    for (const { study, findings } of smoke) {
      expect(findings.length, study.title).toBeGreaterThanOrEqual(study.parts);
      for (const { row, more, tally } of findings) {
        expect(row.length, study.title).toBe(study.columns.row.length);
        expect(more.length, study.title).toBe(study.columns.more.length);
        expect(tally.hits).toBeLessThanOrEqual(tally.trials);
      }
    }
  });

  it('answer a question alike each time, whatever was asked before', () => {
    const question = { study: 'planted', part: 0, seed: 3, effort: 0.02 };
    const first = answer(question);
    answer({ ...question, part: 1 });
    expect(answer(question)).toEqual(first);
    expect(answer({ ...question, seed: 4 })).not.toEqual(first);
  });
});

describe('results/honesty.md', () => {
  const committed = read('results/honesty.md');

  it('was made by the command that it names', () => {
    expect(committed).toContain(`\`${command}\``);
    const { scripts } = JSON.parse(read('package.json')) as { scripts: Record<string, string> };
    expect(scripts[command.replace('npm run ', '')]).toContain('dist/tests/honesty/run.js');
  });

  it('holds every study and every row of the script as it is now, and what they were told', () => {
    const fresh = renderReport(smoke, { scores: readScores(), seed: 1 });
    const heads = (text: string) => text.split('\n').filter((line) => !line.startsWith('| '));
    expect(heads(committed)).toEqual(heads(fresh));
    for (const { study, findings } of smoke) {
      for (const { row } of findings) expect(committed, study.title).toContain(`\n| ${row.join(' | ')} | `);
    }
  });

  it('is quoted rightly by the README: every share of its paragraph but those promised stands in a table', () => {
    const readme = read('README.md');
    const paragraph = readme.slice(readme.indexOf('## How honest is it?'), readme.indexOf('Before you make'));
    const quoted = [...paragraph.matchAll(/\d+\.\d %/g)].map(([share]) => share);
    expect(quoted.length).toBeGreaterThanOrEqual(5);
    for (const share of quoted) expect(committed).toContain(`| ${share} ± `);
  });
});
