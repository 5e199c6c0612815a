import type { OptimumKnowledge } from '../harness/task.js';
import { describeComparison } from './comparison-foot.js';
import type { Estimate, IntervalMethod } from './estimate.js';
import type { Overall } from './overall.js';
import type { Against } from './reference.js';
import type { CountRange, Section } from './section.js';
import { transformedFrom } from './statistics/mean-interval.js';
import { describeChoices } from './sweep/describe-choices.js';
import type { SweepChoices } from './sweep.js';

/** What a column of the tables means. */
export interface ColumnMeaning {
  readonly column: string;
  readonly meaning: string;
}

/** How the top of one task is known. */
export interface TopKnown {
  readonly task: string;
  readonly curtain: string;
  readonly known: readonly OptimumKnowledge[];
}

/** Everything that a reader needs to judge the tables on their own. */
export interface Foot {
  /** What 0 and 1 stand for. */
  readonly scale: string;
  readonly columns: readonly ColumnMeaning[];
  /** Seeds of each task and curtain. */
  readonly seeds: CountRange;
  readonly curtains: readonly string[];
  readonly tops: readonly TopKnown[];
  /** How settings were chosen, and what that leaves to report; empty where there was nothing to choose. */
  readonly sweeps: readonly string[];
  /** How the intervals were made; empty where one seed allows none. */
  readonly intervals: readonly string[];
  /** How methods were held against the reference; empty where there was none to compare. */
  readonly comparison: readonly string[];
  readonly failures: string;
  readonly version: string;
}

const columns: readonly ColumnMeaning[] = [
  { column: 'best', meaning: 'highest true score of the batch (100th percentile), mean over seeds' },
  { column: 'median', meaning: 'median true score of the batch (50th percentile), mean over seeds' },
  { column: 'IQM', meaning: 'interquartile mean of best over the cells of all tasks' },
  { column: 'lift', meaning: 'best minus best visible: what the batch gained over the table' },
  {
    column: 'optimism',
    meaning: 'believed minus true score, mean over the batch; – if no belief was stated',
  },
  {
    column: 'failed',
    meaning: 'cells that failed, of how many; a cell is one method on one task with one seed',
  },
  { column: 'distinct', meaning: 'different designs in a batch, mean over the cells that did not fail' },
  { column: 'seconds', meaning: 'wall-clock time of one cell, mean' },
];

/** Writes the foot of a comparison. */
export function writeFoot(
  sections: readonly Section[],
  overall: Overall | null,
  options: {
    readonly version: string;
    readonly resamples: number;
    readonly against: Against;
    readonly sweeps: SweepChoices | null;
  },
): Foot {
  const seeds = sections.map((section) => section.seeds);
  return {
    scale:
      'True scores, normalized: 0 is the worst design of the pool, 1 the top; scores outside are possible and never clipped.',
    columns: columns.filter(({ column }) => column !== 'IQM' || overall !== null),
    seeds: { least: Math.min(...seeds), most: Math.max(...seeds) },
    curtains: [...new Set(sections.map(({ curtain }) => curtain))],
    tops: sections.map(({ task, curtain, top }) => ({ task, curtain, known: top })),
    sweeps: options.sweeps === null ? [] : describeChoices(options.sweeps),
    intervals: describeIntervals(sections, overall, options.resamples),
    comparison: describeComparison(sections, overall, options.against),
    failures: describeFailures(sections),
    version: options.version,
  };
}

function describeFailures(sections: readonly Section[]): string {
  const all = sections.flatMap(({ methods }) => methods);
  const failures = all.reduce((sum, scores) => sum + scores.failures, 0);
  const cells = all.reduce((sum, scores) => sum + scores.cells, 0);
  return `${failures} of ${cells} cells failed. A failed cell counts as a batch of copies of the worst visible design; it stays in every mean but that of optimism.`;
}

function describeIntervals(
  sections: readonly Section[],
  overall: Overall | null,
  resamples: number,
): string[] {
  const means = sections.flatMap(({ bestVisible, methods }) => [
    bestVisible,
    ...methods.flatMap(({ best, median, lift, optimism }) => [best, median, lift, optimism]),
  ]);
  const aggregates =
    overall === null ? [] : [overall.bestVisible.mean, ...overall.methods.map((it) => it.lift)];
  const iqms = overall === null ? [] : overall.methods.map(({ best }) => best.interquartileMean);
  const draws = resamples.toLocaleString('en-US');
  const texts: [boolean, string][] = [
    [
      uses(means, 'transformed-t'),
      '95 % intervals of means over seeds: t transformed to allow for skewness (Hall 1992).',
    ],
    [
      uses(means, 'student-t'),
      `95 % intervals of means over fewer than ${transformedFrom} seeds: Student's t, which supposes normal scores.`,
    ],
    [
      uses(aggregates, 'stratified-t'),
      "95 % intervals of means over all tasks: t with Satterthwaite's degrees of freedom (Satterthwaite 1946).",
    ],
    [
      uses(iqms, 'stratified-expanded-percentile'),
      `95 % intervals of the IQM: bootstrap over the seeds within each task (Agarwal et al. 2021), ${draws} resamples, expanded percentiles (Hesterberg 2015).`,
    ],
    [means.some((estimate) => estimate?.interval === null), 'No interval where there is a single cell.'],
    [
      uses(means, 'constant'),
      'Where all seeds gave the same score both bounds stand at it, which does not make it certain.',
    ],
  ];
  return texts.filter(([used]) => used).map(([, text]) => text);
}

function uses(estimates: readonly (Estimate | null)[], method: IntervalMethod): boolean {
  return estimates.some((estimate) => estimate?.interval?.method === method);
}
