import { writeToString } from 'fast-csv';
import type { Comparison } from '../comparison.js';
import type { Estimate } from '../estimate.js';
import type { Overall, OverallScores } from '../overall.js';
import type { ReferenceBlock } from '../reference.js';
import type { MethodScores, Section } from '../section.js';
import type { SweepChoices } from '../sweep.js';
import type { SeedsNeeded } from '../verdict.js';

type Fields = Record<string, string | number | null>;

const estimates = [
  'best',
  'bestInterquartile',
  'median',
  'medianInterquartile',
  'lift',
  'optimism',
  'difference',
] as const;

const columns: readonly string[] = [
  ...['scope', 'task', 'curtain', 'row', 'method', 'settings', 'tasks', 'cells', 'failures'],
  ...estimates.flatMap((name) => [name, `${name}Low`, `${name}High`, `${name}Interval`, `${name}Cells`]),
  ...[
    'reference',
    'score',
    'margin',
    'p',
    'adjustedP',
    'test',
    'equivalenceP',
    'adjustedEquivalenceP',
    'verdict',
    'seedsNeeded',
    'pairs',
    'wins',
    'ties',
    'losses',
    'meanRank',
    'criticalDifference',
    'beatVisible',
    'beatVisibleLow',
    'beatVisibleHigh',
    'level',
    'distinct',
    'seconds',
    'top',
    'batchLeast',
    'batchMost',
    'visibleLeast',
    'visibleMost',
    'sweepVariants',
    'sweepChosen',
    'sweepChosenOn',
    'version',
  ],
];

/**
 * A comparison as tidy CSV: a header, then one line for each method and one for best visible in each section and over
 * all tasks. Numbers have full precision; what is missing is empty.
 */
export function renderCsv({ sections, overall, level, version, sweeps }: Comparison): Promise<string> {
  const lines = [...sections.flatMap(sectionFields), ...(overall === null ? [] : overallFields(overall))].map(
    (fields) => {
      const all: Fields = { level, version, ...sweepFields(fields['method'], sweeps), ...fields };
      return columns.map((column) => all[column] ?? '');
    },
  );
  return writeToString([columns as string[], ...lines], { includeEndRowDelimiter: true });
}

/** Which variant stands under the label of a sweep, and what it was chosen on. */
function sweepFields(method: Fields[string] | undefined, sweeps: SweepChoices | null): Fields {
  const choice = sweeps?.choices.find((it) => it.method === method);
  if (sweeps === null || choice === undefined) return {};
  return {
    sweepVariants: choice.variants,
    sweepChosen: choice.variant,
    sweepChosenOn: sweeps.on === 'same cells' ? 'CAUTION: same cells' : `other half of ${sweeps.on}`,
  };
}

function sectionFields(section: Section): Fields[] {
  const { task, curtain, top, batch, visible, bestVisible } = section;
  const shared: Fields = {
    scope: 'task',
    task,
    curtain,
    tasks: 1,
    top: top.join(' '),
    batchLeast: batch.least,
    batchMost: batch.most,
    visibleLeast: visible.least,
    visibleMost: visible.most,
  };
  return [
    { ...shared, ...bestVisibleFields(bestVisible) },
    ...section.methods.map((scores) => ({
      ...shared,
      ...methodFields(scores),
      ...referenceFields(scores.method, section.reference),
      ...estimateFields('best', scores.best),
      ...estimateFields('median', scores.median),
    })),
  ];
}

function overallFields({ sections, bestVisible, methods, reference, ranks }: Overall): Fields[] {
  return [
    {
      scope: 'all tasks',
      tasks: sections,
      ...bestVisibleFields(bestVisible.mean),
      ...estimateFields('bestInterquartile', bestVisible.interquartileMean),
    },
    ...methods.map((scores) => ({
      scope: 'all tasks',
      tasks: scores.sections,
      ...methodFields(scores),
      ...referenceFields(scores.method, reference),
      meanRank: ranks?.methods.find(({ method }) => method === scores.method)?.meanRank ?? null,
      criticalDifference: ranks?.criticalDifference ?? null,
      ...estimateFields('best', scores.best.mean),
      ...estimateFields('bestInterquartile', scores.best.interquartileMean),
      ...estimateFields('median', scores.median.mean),
      ...estimateFields('medianInterquartile', scores.median.interquartileMean),
    })),
  ];
}

function bestVisibleFields(best: Estimate): Fields {
  return { row: 'best visible', cells: best.n, ...estimateFields('best', best) };
}

function referenceFields(method: string, block: ReferenceBlock | null): Fields {
  const against = block?.methods.find((it) => it.method === method);
  if (block === null || against === undefined) return {};
  const { p, adjustedP, test, equivalenceP, adjustedEquivalenceP, verdict, seedsNeeded } = against;
  const { pairs, wins, ties, losses, difference } = against;
  return {
    ...{ reference: block.method, score: block.score, margin: block.margin },
    ...{ p, adjustedP, test, equivalenceP, adjustedEquivalenceP, verdict, pairs, wins, ties, losses },
    seedsNeeded: seedsNeeded === null ? null : writeSeeds(seedsNeeded),
    ...estimateFields('difference', difference),
  };
}

function writeSeeds(needed: SeedsNeeded): string | number {
  if (needed.kind === 'about') return needed.seeds;
  return needed.kind === 'unknown' ? 'unknown' : `>${needed.seeds}`;
}

function methodFields(scores: MethodScores | OverallScores): Fields {
  const { method, settings, cells, failures, lift, optimism, distinct, seconds, beatVisible } = scores;
  return {
    ...{ row: 'method', method, settings, cells, failures, distinct, seconds },
    ...{ beatVisible: beatVisible.share, beatVisibleLow: beatVisible.low, beatVisibleHigh: beatVisible.high },
    ...estimateFields('lift', lift),
    ...(optimism === null ? {} : estimateFields('optimism', optimism)),
  };
}

function estimateFields(name: (typeof estimates)[number], { value, n, interval }: Estimate): Fields {
  return {
    [name]: value,
    [`${name}Low`]: interval?.low ?? null,
    [`${name}High`]: interval?.high ?? null,
    [`${name}Interval`]: interval?.method ?? 'none',
    [`${name}Cells`]: n,
  };
}
