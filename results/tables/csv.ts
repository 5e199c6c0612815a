import { writeToString } from 'fast-csv';
import type { Comparison } from '../comparison.js';
import type { Estimate } from '../estimate.js';
import type { Overall, OverallScores } from '../overall.js';
import type { MethodScores, Section } from '../section.js';

type Fields = Record<string, string | number | null>;

const estimates = ['best', 'bestInterquartile', 'median', 'medianInterquartile', 'lift', 'optimism'] as const;

const columns: readonly string[] = [
  ...['scope', 'task', 'curtain', 'row', 'method', 'settings', 'tasks', 'cells', 'failures'],
  ...estimates.flatMap((name) => [name, `${name}Low`, `${name}High`, `${name}Interval`, `${name}Cells`]),
  ...[
    'level',
    'distinct',
    'seconds',
    'top',
    'batchLeast',
    'batchMost',
    'visibleLeast',
    'visibleMost',
    'version',
  ],
];

/**
 * A comparison as tidy CSV: a header, then one line for each method and one for best visible in each section and over
 * all tasks. Numbers have full precision; what is missing is empty.
 */
export function renderCsv({ sections, overall, level, version }: Comparison): Promise<string> {
  const lines = [...sections.flatMap(sectionFields), ...(overall === null ? [] : overallFields(overall))].map(
    (fields) => columns.map((column) => ({ level, version, ...fields })[column] ?? ''),
  );
  return writeToString([columns as string[], ...lines], { includeEndRowDelimiter: true });
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
      ...estimateFields('best', scores.best),
      ...estimateFields('median', scores.median),
    })),
  ];
}

function overallFields({ sections, bestVisible, methods }: Overall): Fields[] {
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

function methodFields(scores: MethodScores | OverallScores): Fields {
  const { method, settings, cells, failures, lift, optimism, distinct, seconds } = scores;
  return {
    ...{ row: 'method', method, settings, cells, failures, distinct, seconds },
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
