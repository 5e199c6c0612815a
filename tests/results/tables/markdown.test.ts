import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compareRows } from '../../../results/comparison.js';
import { escapeMarkdown, renderMarkdown } from '../../../results/tables/markdown.js';
import { makeRow } from '../made-ledger.js';
import { anyRows } from './any-rows.js';
import { smallComparison } from './small-comparison.js';

/** Pipes of a line that a renderer takes for the edges of cells. */
function countEdges(line: string): number {
  return line.replaceAll(/\\./g, '').split('|').length - 1;
}

describe('renderMarkdown(comparison)', () => {
  it('writes a heading and a pipe table for each task and for all, what stands out, and how to read it', () => {
    expect(renderMarkdown(smallComparison)).toMatchInlineSnapshot(`
      "# Comparison

      True scores, normalized: 0 is the worst design of the pool, 1 the top; scores outside are possible and never clipped. Brackets hold 95 % intervals. Methods above the row "best visible" found, on average, better designs than the table held.

      ## hartmann-6

      curtain ceiling=0.5 · 3 seeds · batch of 128 · 200 visible rows · 1 = published optimum

      | method | best | median | lift | optimism | failed | distinct | seconds |
      | :--- | ---: | ---: | ---: | ---: | ---: | ---: | ---: |
      | careful | 0.800 \\[0.552, 1.048\\] | 0.600 \\[0.352, 0.848\\] | +0.190 \\[-0.034, +0.414\\] | – | 0/3 | 128 | 2.0 |
      | **best visible** (line to beat) | 0.610 \\[0.585, 0.635\\] | – | – | – | – | – | – |
      | naive | 0.400 \\[0.152, 0.648\\] | 0.200 \\[-0.048, 0.448\\] | -0.210 \\[-0.472, +0.052\\] | +0.550 \\[-0.085, +1.185\\] | 1/3 | 128 | 2.0 |

      Against careful, by best:

      | method | difference | p | verdict | w/t/l | beat visible |
      | :--- | ---: | ---: | ---: | ---: | ---: |
      | careful | – | – | reference | – | 100 % \\[44, 100\\] |
      | naive | -0.400 \\[-0.830, +0.030\\] | 0.250 | undecided (6) | 0/0/3 | 0 % \\[0, 56\\] |

      True scores, normalized: 0 is the worst design of the pool, 1 the top; brackets hold 95 % intervals. 3 seeds. difference: best minus that of careful on the same seed, 3 pairs. p: sign-flip test, Holm-corrected for 1 test. verdict at 0.05, margin ±0.02; in parentheses the seeds a task that would decide at 80 % power. 1 of 6 cells failed, counted as batches of the worst visible design. curtain: ceiling=0.5. top: published optimum. onebatch 0.1.0.

      ## nk(20, 3)

      curtain ceiling=0.5 · 3 seeds · batch of 128 · 200 visible rows · 1 = best known score

      | method | best | median | lift | optimism | failed | distinct | seconds |
      | :--- | ---: | ---: | ---: | ---: | ---: | ---: | ---: |
      | careful | 0.900 \\[0.652, 1.148\\] | 0.600 \\[0.352, 0.848\\] | +0.290 \\[+0.066, +0.514\\] | – | 0/3 | 128 | 2.0 |
      | **best visible** (line to beat) | 0.610 \\[0.585, 0.635\\] | – | – | – | – | – | – |
      | naive | 0.500 \\[0.252, 0.748\\] | 0.200 \\[-0.048, 0.448\\] | -0.110 \\[-0.372, +0.152\\] | +0.600 \\[+0.352, +0.848\\] | 0/3 | 128 | 2.0 |

      Against careful, by best:

      | method | difference | p | verdict | w/t/l | beat visible |
      | :--- | ---: | ---: | ---: | ---: | ---: |
      | careful | – | – | reference | – | 100 % \\[44, 100\\] |
      | naive | -0.400 \\[-0.830, +0.030\\] | 0.250 | undecided (6) | 0/0/3 | 0 % \\[0, 56\\] |

      True scores, normalized: 0 is the worst design of the pool, 1 the top; brackets hold 95 % intervals. 3 seeds. difference: best minus that of careful on the same seed, 3 pairs. p: sign-flip test, Holm-corrected for 1 test. verdict at 0.05, margin ±0.02; in parentheses the seeds a task that would decide at 80 % power. 0 of 6 cells failed, counted as batches of the worst visible design. curtain: ceiling=0.5. top: best known score. onebatch 0.1.0.

      ## All tasks

      2 tasks · mean of the tasks' means · IQM: interquartile mean over all cells

      | method | best | IQM of best | median | IQM of median | lift | optimism | failed | distinct | seconds |
      | :--- | ---: | ---: | ---: | ---: | ---: | ---: | ---: | ---: | ---: |
      | careful | 0.850 \\[0.737, 0.963\\] | 0.850 \\[0.750, 0.950\\] | 0.600 \\[0.487, 0.713\\] | 0.600 \\[0.500, 0.700\\] | +0.240 \\[+0.138, +0.342\\] | – | 0/6 | 128 | 2.0 |
      | **best visible** (line to beat) | 0.610 \\[0.599, 0.621\\] | 0.610 \\[0.600, 0.620\\] | – | – | – | – | – | – | – |
      | naive | 0.450 \\[0.337, 0.563\\] | 0.450 \\[0.350, 0.550\\] | 0.200 \\[0.087, 0.313\\] | 0.200 \\[0.100, 0.300\\] | -0.160 \\[-0.279, -0.041\\] | +0.575 \\[+0.451, +0.699\\] | 1/6 | 128 | 2.0 |

      Against careful, by best:

      | method | difference | p | verdict | w/t/l | rank | beat visible |
      | :--- | ---: | ---: | ---: | ---: | ---: | ---: |
      | careful | – | – | reference | – | 1.00 | 100 % \\[61, 100\\] |
      | naive | -0.400 \\[-0.596, -0.204\\] | 0.031 | hurts | 0/0/6 | 2.00 | 0 % \\[0, 39\\] |

      True scores, normalized: 0 is the worst design of the pool, 1 the top; brackets hold 95 % intervals. 3 seeds a task. difference: best minus that of careful on the same seed, 6 pairs. p: sign-flip test, Holm-corrected for 1 test. verdict at 0.05, margin ±0.02; in parentheses the seeds a task that would decide at 80 % power. 1 of 12 cells failed, counted as batches of the worst visible design. curtains: ceiling=0.5. top: published optimum or best known score. onebatch 0.1.0.

      ## Fooled by its own model

      - naive believed its batch 0.60 \\[0.35, 0.85\\] above the truth on nk(20, 3), and its best design fell 0.11 short of the best visible one on average.

      ## Failed

      - naive failed 1 of 3 cells on hartmann-6: out of time after 20 s.

      ## How to read this

      - best: highest true score of the batch (100th percentile), mean over seeds.
      - median: median true score of the batch (50th percentile), mean over seeds.
      - IQM: interquartile mean of best over the cells of all tasks.
      - lift: best minus best visible: what the batch gained over the table.
      - optimism: believed minus true score, mean over the batch; – if no belief was stated.
      - failed: cells that failed, of how many; a cell is one method on one task with one seed.
      - distinct: different designs in a batch, mean over the cells that did not fail.
      - seconds: wall-clock time of one cell, mean.
      - Seeds for each task: 3.
      - 95 % intervals of means over fewer than 8 seeds: Student's t, which supposes normal scores.
      - 95 % intervals of means over all tasks: t with Satterthwaite's degrees of freedom (Satterthwaite 1946).
      - 95 % intervals of the IQM: bootstrap over the seeds within each task (Agarwal et al. 2021), 2,000 resamples, expanded percentiles (Hesterberg 2015).
      - difference: best minus that of careful, paired by task, curtain and seed, 3 pairs a task, 6 pairs over all tasks; 95 % intervals, each for its own method and not corrected for their number: Student's t, over all tasks t with Satterthwaite's degrees of freedom.
      - p: two-sided sign-flip test (Fisher 1935) by all patterns of signs up to 16 pairs and 20,000 drawn ones beyond, corrected for the 1 test of a table (Holm 1979).
      - verdict: helps or hurts: p \\< 0.05 and the interval excludes 0; no real difference: within ±0.02 by two one-sided t tests (Schuirmann 1987), Holm-corrected as a family of their own, p \\< 0.05; undecided: neither, with the seeds a task that would decide at 80 % power if more are like these.
      - w/t/l: pairs won, tied and lost, with the difference above, within and below ±0.02; beat visible: cells with a design better than the best visible one (Wilson 1927).
      - 3 pairs and 1 test allow no p below 0.250: to help or hurt on a single task takes 6 seeds at least.
      - rank: mean over 2 tasks, 1 is best, ties averaged; Friedman's test, F(1, 1) = infinite by Iman \\& Davenport (1980), p = 0.500; ranks closer than the critical difference can't be told apart at 5 % (Nemenyi 1963; Demšar 2006), here 1.39, more than any two of 2 can differ by: too few tasks to tell methods apart by rank. Not told apart: careful, naive.
      - 1 of 12 cells failed. A failed cell counts as a batch of copies of the worst visible design; it stays in every mean but that of optimism.
      - Made by onebatch 0.1.0.
      "
    `);
  });

  it('has rows with as many cells as their header, whatever the labels', () => {
    fc.assert(
      fc.property(anyRows, (rows) => {
        const text = renderMarkdown(compareRows(rows, { version: '0.1.0', resamples: 10 }));
        const blocks = text.split('\n\n').filter((block) => block.startsWith('| method |'));
        expect(blocks.length).toBeGreaterThan(0);
        for (const block of blocks) expect(new Set(block.trimEnd().split('\n').map(countEdges)).size).toBe(1);
      }),
      { numRuns: 60 },
    );
  });

  it('shows a label with pipes as it is written', () => {
    const text = renderMarkdown(compareRows([makeRow({ method: 'a|b_c', seed: 0 })], { version: '0.1.0' }));
    expect(text).toContain('| a\\|b\\_c |');
  });
});

describe('escapeMarkdown(text)', () => {
  it('makes markup literal and line breaks spaces', () => {
    expect(escapeMarkdown('*a* <b>\n`c` [d](e)')).toBe('\\*a\\* \\<b\\> \\`c\\` \\[d\\](e)');
  });
});
