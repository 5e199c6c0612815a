import { stripVTControlCharacters } from 'node:util';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CellRow } from '../../../harness/row.js';
import { compareRows } from '../../../results/comparison.js';
import { renderTerminal, terminalWidth } from '../../../results/tables/terminal.js';
import { textWidth } from '../../../results/tables/text-width.js';
import { makeRow } from '../made-ledger.js';
import { anyRows } from './any-rows.js';
import { smallComparison, smallLedger } from './small-comparison.js';

const version = '0.1.0';

describe('renderTerminal(comparison, options)', () => {
  it('shows each task, all tasks, what stands out, and how to read it', () => {
    expect(renderTerminal(smallComparison)).toMatchInlineSnapshot(`
      "True scores, 0 = worst design of the pool, 1 = top. Brackets hold 95 % intervals. Methods above the
      line "best visible" found, on average, better designs than the table held.

      hartmann-6 · 1 = published optimum
      curtain ceiling=0.5 · 3 seeds · batch of 128 · 200 visible rows
      method         best [95 %]          median [95 %]             lift  optimism  failed  seconds
      careful       0.800 [0.552, 1.048]   0.600 [ 0.352, 0.848]  +0.190         –     0/3      2.0
      best visible  0.610 [0.585, 0.635]  ── line to beat ─────────────────────────────────────────
      naive         0.400 [0.152, 0.648]   0.200 [-0.048, 0.448]  -0.210    +0.550     1/3      2.0

      = against careful on hartmann-6: undecided: all 1, the nearest (naive) at about 6 seeds
      x naive failed 1 of 3 cells on hartmann-6: out of time after 20 s

      nk(20, 3) · 1 = best known score
      curtain ceiling=0.5 · 3 seeds · batch of 128 · 200 visible rows
      method         best [95 %]          median [95 %]             lift  optimism  failed  seconds
      careful       0.900 [0.652, 1.148]   0.600 [ 0.352, 0.848]  +0.290         –     0/3      2.0
      best visible  0.610 [0.585, 0.635]  ── line to beat ─────────────────────────────────────────
      naive         0.500 [0.252, 0.748]   0.200 [-0.048, 0.448]  -0.110    +0.600     0/3      2.0

      = against careful on nk(20, 3): undecided: all 1, the nearest (naive) at about 6 seeds
      ! naive believed its batch 0.60 [0.35, 0.85] above the truth on nk(20, 3), and its best design fell
        0.11 short of the best visible one on average

      All tasks
      2 tasks · mean of the tasks' means · IQM: interquartile mean of best over all cells
      method         best [95 %]            IQM [95 %]          median    lift  optimism  failed  seconds
      careful       0.850 [0.737, 0.963]  0.850 [0.750, 0.950]   0.600  +0.240         –     0/6      2.0
      best visible  0.610 [0.599, 0.621]  0.610 [0.600, 0.620]  ── line to beat ─────────────────────────
      naive         0.450 [0.337, 0.563]  0.450 [0.350, 0.550]   0.200  -0.160    +0.575     1/6      2.0

      Against careful, by best:
      method   difference [95 %]                p  verdict    w/t/l  rank     beat visible
      careful                                      reference          1.0  100 % [61, 100]
      naive        -0.400 [-0.596, -0.204]  0.031  hurts      0/0/6   2.0      0 % [0, 39]

      best      highest true score of the batch (100th percentile), mean over seeds
      median    median true score of the batch (50th percentile), mean over seeds
      lift      best minus best visible: what the batch gained over the table
      optimism  believed minus true score, mean over the batch; – if no belief was stated
      failed    cells that failed, of how many; a cell is one method on one task with one seed
      seconds   wall-clock time of one cell, mean
      95 % intervals of means over fewer than 8 seeds: Student's t, which supposes normal scores.
      95 % intervals of means over all tasks: t with Satterthwaite's degrees of freedom (Satterthwaite
        1946).
      95 % intervals of the IQM: bootstrap over the seeds within each task (Agarwal et al. 2021), 2,000
        resamples, expanded percentiles (Hesterberg 2015).
      difference: best minus that of careful, paired by task, curtain and seed, 3 pairs a task, 6 pairs
        over all tasks; 95 % intervals, each for its own method and not corrected for their number:
        Student's t, over all tasks t with Satterthwaite's degrees of freedom.
      p: two-sided sign-flip test (Fisher 1935) by all patterns of signs up to 16 pairs and 20,000 drawn
        ones beyond, corrected for the 1 test of a table (Holm 1979).
      verdict: helps or hurts: p < 0.05 and the interval excludes 0; no real difference: within ±0.02 by
        two one-sided t tests (Schuirmann 1987), Holm-corrected as a family of their own, p < 0.05;
        undecided: neither, with the seeds a task that would decide at 80 % power if more are like these.
      w/t/l: pairs won, tied and lost, with the difference above, within and below ±0.02; beat visible:
        cells with a design better than the best visible one (Wilson 1927).
      3 pairs and 1 test allow no p below 0.250: to help or hurt on a single task takes 6 seeds at least.
      rank: mean over 2 tasks, 1 is best, ties averaged; Friedman's test, F(1, 1) = infinite by Iman &
        Davenport (1980), p = 0.500; ranks closer than the critical difference can't be told apart at 5 %
        (Nemenyi 1963; Demšar 2006), here 1.39, more than any two of 2 can differ by: too few tasks to
        tell methods apart by rank. Not told apart: careful, naive.
      1 of 12 cells failed. A failed cell counts as a batch of copies of the worst visible design; it
        stays in every mean but that of optimism.
      onebatch 0.1.0
      "
    `);
  });

  it('shows no brackets for a single seed', () => {
    const single = compareRows(
      smallLedger.filter(({ seed, task }) => seed === 0 && task === 'hartmann-6'),
      { version },
    );
    expect(renderTerminal(single)).toMatchInlineSnapshot(`
      "True scores, 0 = worst design of the pool, 1 = top. Methods above the line "best visible" found, on
      average, better designs than the table held.

      hartmann-6 · 1 = published optimum
      curtain ceiling=0.5 · 1 seed · batch of 128 · 200 visible rows
      method         best  median    lift  optimism  failed  seconds
      careful       0.700   0.500  +0.100         –     0/1        –
      best visible  0.600  ── line to beat ─────────────────────────
      naive         0.400   0.200  -0.200    +0.500     0/1        –

      Against careful, by best:
      method   difference      p  verdict             w/t/l     beat visible
      careful                     reference                  100 % [21, 100]
      naive        -0.300  1.000  undecided (1 seed)  0/0/1      0 % [0, 79]

      best      highest true score of the batch (100th percentile), mean over seeds
      median    median true score of the batch (50th percentile), mean over seeds
      lift      best minus best visible: what the batch gained over the table
      optimism  believed minus true score, mean over the batch; – if no belief was stated
      failed    cells that failed, of how many; a cell is one method on one task with one seed
      seconds   wall-clock time of one cell, mean
      No interval where there is a single cell.
      difference: best minus that of careful, paired by task, curtain and seed, 1 pair a task.
      p: two-sided sign-flip test (Fisher 1935) by all patterns of signs up to 16 pairs and 20,000 drawn
        ones beyond, corrected for the 1 test of a table (Holm 1979).
      verdict: helps or hurts: p < 0.05 and the interval excludes 0; no real difference: within ±0.02 by
        two one-sided t tests (Schuirmann 1987), Holm-corrected as a family of their own, p < 0.05;
        undecided: neither, with the seeds a task that would decide at 80 % power if more are like these.
      w/t/l: pairs won, tied and lost, with the difference above, within and below ±0.02; beat visible:
        cells with a design better than the best visible one (Wilson 1927).
      1 pair and 1 test allow no p below 1.000: to help or hurt on a single task takes 6 seeds at least.
      0 of 2 cells failed. A failed cell counts as a batch of copies of the worst visible design; it stays
        in every mean but that of optimism.
      onebatch 0.1.0
      "
    `);
  });

  it('shows what is not clipped in compact form, and labels of 30 characters in full', () => {
    const label = 'conservative-with-a-long-label';
    const rows = [0, 1, 2].flatMap((seed) => [
      makeRow({ method: label, seed, best: 0.9, median: -0.2 - seed / 10, optimism: 12.3 + seed }),
      makeRow({
        method: 'runaway',
        seed,
        best: -1.5e5 * (1 + seed / 10),
        median: -2e5 - seed,
        optimism: 1.4e6,
      }),
    ]);
    const text = renderTerminal(compareRows(rows, { version }));
    expect(text).toContain(`\n${label} `);
    expect(text.split('\n').slice(5, 9).join('\n')).toMatchInlineSnapshot(`
      "method                         best [95 %]      median [95 %]         lift optimism failed seconds
      conservative-with-a-long-label 0.90 [0.90 0.90]  -0.30 [-0.55 -0.05] +0.30    +13.3    0/3       –
      best visible                   0.60 [0.60 0.60] ── line to beat ──────────────────────────────────
      runaway                        -2e5 [-2e5 -1e5]   -2e5 [ -2e5  -2e5]  -2e5     +1e6    0/3       –"
    `);
  });

  it('shortens a label of 40 characters to 30, and further only where the numbers leave less room', () => {
    const shown = (scores: Partial<CellRow>): { label: string; widest: number } => {
      const rows = ['t1', 't2'].flatMap((task) =>
        [0.5, 1].map((sign, seed) =>
          makeRow({ task, method: 'x'.repeat(40), seed, ...scores, best: sign * (scores.best ?? 0.7) }),
        ),
      );
      const lines = renderTerminal(compareRows(rows, { version, resamples: 10 })).split('\n');
      const label = lines.find((line) => line.startsWith('xxx'))!.split(' ')[0]!;
      return { label, widest: Math.max(...lines.map(textWidth)) };
    };
    expect(shown({})).toEqual({ label: `${'x'.repeat(29)}…`, widest: expect.any(Number) });
    const huge = shown({ best: -1e100, median: -1e101, optimism: 1e102, bestVisible: -1e103 });
    expect(huge.label.length).toBeLessThan(30);
    expect(huge.widest).toBe(terminalWidth);
  });

  it('has no line wider than 100 columns, whatever the labels and values', () => {
    fc.assert(
      fc.property(anyRows, (rows) => {
        const text = renderTerminal(compareRows(rows, { version, resamples: 10 }));
        const widths = text.split('\n').map(textWidth);
        expect(Math.max(...widths)).toBeLessThanOrEqual(terminalWidth);
      }),
      { numRuns: 100 },
    );
  });

  it('has a row for every method, however many of its cells failed', () => {
    const rows = [0, 1].map((seed) =>
      makeRow({ method: 'broken', seed, best: 0.1, status: 'failed', reason: 'threw: no' }),
    );
    const text = renderTerminal(compareRows(rows, { version }));
    expect(text).toMatch(/\nbroken .* 2\/2 /);
    expect(text).toContain('x broken failed 2 of 2 cells on hartmann-6: threw: no');
  });

  it('lets no label break a line or send a control sequence', () => {
    const rows = [makeRow({ method: 'evil\n\u001b[31m', task: 'two\nlines', curtain: 'a\tb', seed: 0 })];
    const text = renderTerminal(compareRows(rows, { version }));
    expect(stripVTControlCharacters(text)).toBe(text);
    expect(text).toContain('\ntwo lines · 1 = published optimum\ncurtain a b ·');
  });

  it('adds nothing but bold and dim when asked for style', () => {
    const styled = renderTerminal(smallComparison, { style: true });
    expect(stripVTControlCharacters(styled)).toBe(renderTerminal(smallComparison));
    expect(styled).not.toBe(renderTerminal(smallComparison));
  });

  it('is the same text every time', () => {
    expect(renderTerminal(compareRows([...smallLedger].reverse(), { version }))).toBe(
      renderTerminal(compareRows(smallLedger, { version })),
    );
  });
});
