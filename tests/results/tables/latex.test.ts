import { execFileSync } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it, type TestContext } from 'vitest';
import { compareRows } from '../../../results/comparison.js';
import { renderLatex } from '../../../results/tables/latex.js';
import { makeRow } from '../made-ledger.js';
import { smallComparison, smallLedger } from './small-comparison.js';

/** Skips where there is no pdflatex; on the build server that is a failure. */
function needPdflatex({ skip }: TestContext): void {
  try {
    execFileSync('pdflatex', ['-version'], { stdio: 'ignore' });
  } catch (cause) {
    if (process.env['CI']) throw new Error('pdflatex is missing; .ci/run installs it', { cause });
    skip('pdflatex is not installed here; .ci/run installs it');
  }
}

/** What pdflatex says of a document, once it has compiled it. */
async function compile(document: string): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), 'onebatch-latex-'));
  try {
    await writeFile(join(folder, 'table.tex'), document);
    execFileSync('pdflatex', ['-interaction=nonstopmode', '-halt-on-error', 'table.tex'], {
      cwd: folder,
      stdio: 'ignore',
    });
    return await readFile(join(folder, 'table.log'), 'utf8');
  } finally {
    await rm(folder, { recursive: true });
  }
}

describe('renderLatex(comparison)', () => {
  it('gives a booktabs table for each task and one over all, in ASCII', () => {
    const text = renderLatex(smallComparison);
    expect(text).toMatch(/^[\n -~]*$/);
    expect(text.match(/\\toprule/g)).toHaveLength(3);
    expect(text.match(/\\begin\{tabular\}/g)).toHaveLength(3);
    expect(text).toContain('\\usepackage{booktabs}');
  });

  it('puts under each table what lets it stand alone', () => {
    const tables = renderLatex(smallComparison).split('\\end{table}').slice(0, 3);
    for (const table of tables) {
      for (const fact of [
        '3 seeds',
        'pair',
        'Holm',
        'margin',
        'failed',
        'ceiling=0.5',
        'top:',
        'onebatch 0.1.0',
      ])
        expect(table).toContain(fact);
    }
    expect(tables[0]).toContain('published optimum');
    expect(tables[1]).toContain('best known');
    expect(tables[2]).toContain('Friedman');
  });

  it('compiles with pdflatex, and nothing runs over the page', { timeout: 60_000 }, async (context) => {
    needPdflatex(context);
    const log = await compile(renderLatex(smallComparison));
    expect(log).not.toMatch(/^!|Overfull/m);
  });

  it('compiles whatever the labels hold', { timeout: 60_000 }, async (context) => {
    needPdflatex(context);
    const odd = ['a_b&c%d#e$f', 'x^y~z\\', '{brace}', 'Grün – ő ≤ 材', '<tag|">', "it's `so`"];
    const rows = smallLedger.flatMap((row) =>
      odd.map((method, i) =>
        makeRow({ ...row, method, task: `task ${odd[(i + 1) % 6]}`, best: row.best + i / 100 }),
      ),
    );
    const unique = [
      ...new Map(rows.map((row) => [JSON.stringify([row.task, row.method, row.seed]), row])).values(),
    ];
    const log = await compile(renderLatex(compareRows(unique, { version: '0.1.0' })));
    expect(log).not.toMatch(/^!/m);
  });
});
