import type { Comparison } from '../comparison.js';
import type { Estimate } from '../estimate.js';
import type { Foot } from '../foot.js';
import {
  formatCount,
  formatDifference,
  formatP,
  formatScore,
  formatSeconds,
  missing,
} from '../format-number.js';
import type { Note, Notes } from '../notes.js';
import type { Overall, OverallScores } from '../overall.js';
import type { Ranks } from '../ranks.js';
import type { ReferenceBlock } from '../reference.js';
import type { MethodScores, Section } from '../section.js';
import { referenceRows } from './reference-rows.js';
import { describeTable } from './table-foot.js';
import { oneLine } from './text-width.js';
import {
  bestVisibleLabel,
  countAbove,
  describeDecision,
  describeOutcomes,
  describeSection,
  describeShare,
  describeTasks,
  describeTop,
} from './words.js';

/** A comparison as Markdown with pipe tables: one for each section, one over all tasks, then what stands out. */
export function renderMarkdown(comparison: Comparison): string {
  const { sections, overall, notes, foot } = comparison;
  const blocks = [
    '# Comparison',
    escapeMarkdown(
      `${foot.scale} Brackets hold 95 % intervals. Methods above the row "${bestVisibleLabel}" found, on average, better designs than the table held.`,
    ),
    ...sections.flatMap((section) => sectionBlocks(comparison, section)),
    ...(overall === null ? [] : overallBlocks(comparison, overall)),
    ...noteBlocks(notes),
    ...footBlocks(foot),
  ];
  return `${blocks.join('\n\n')}\n`;
}

/** A label as the text of a table cell or paragraph, with whatever Markdown would read as markup made literal. */
export function escapeMarkdown(text: string): string {
  return oneLine(text).replace(/[\\`*_{}[\]<>#|~&$]/g, '\\$&');
}

function sectionBlocks(comparison: Comparison, section: Section): string[] {
  const header = ['method', 'best', 'median', 'lift', 'optimism', 'failed', 'distinct', 'seconds'];
  const rows = section.methods.map((scores) => [
    escapeMarkdown(scores.method),
    showEstimate(scores.best, formatScore),
    showEstimate(scores.median, formatScore),
    ...sharedCells(scores),
  ]);
  const place = countAbove(
    section.methods.map(({ best }) => best.value),
    section.bestVisible.value,
  );
  return [
    `## ${escapeMarkdown(section.task)}`,
    escapeMarkdown([...describeSection(section), describeTop(section.top)].join(' · ')),
    pipeTable(header, rows.toSpliced(place, 0, lineToBeat([section.bestVisible]))),
    ...referenceBlocks(section.reference, section.methods, null),
    escapeMarkdown(describeTable(comparison, section)),
  ];
}

function overallBlocks(comparison: Comparison, overall: Overall): string[] {
  const { bestVisible, methods } = overall;
  const header = ['method', 'best', 'IQM of best', 'median', 'IQM of median'];
  const rows = methods.map((scores) => [
    escapeMarkdown(scores.method),
    showEstimate(scores.best.mean, formatScore),
    showEstimate(scores.best.interquartileMean, formatScore),
    showEstimate(scores.median.mean, formatScore),
    showEstimate(scores.median.interquartileMean, formatScore),
    ...sharedCells(scores),
  ]);
  const place = countAbove(
    methods.map(({ best }) => best.mean.value),
    bestVisible.mean.value,
  );
  return [
    '## All tasks',
    `${describeTasks(comparison.sections)} · mean of the tasks' means · IQM: interquartile mean over all cells`,
    pipeTable(
      [...header, 'lift', 'optimism', 'failed', 'distinct', 'seconds'],
      rows.toSpliced(place, 0, lineToBeat([bestVisible.mean, bestVisible.interquartileMean])),
    ),
    ...referenceBlocks(overall.reference, methods, overall.ranks),
    escapeMarkdown(describeTable(comparison, overall)),
  ];
}

function referenceBlocks(
  block: ReferenceBlock | null,
  scores: readonly (MethodScores | OverallScores)[],
  ranks: Ranks | null,
): string[] {
  if (block === null) return [];
  const header = [
    'method',
    'difference',
    'p',
    'verdict',
    'w/t/l',
    ...(ranks ? ['rank'] : []),
    'beat visible',
  ];
  const rows = referenceRows(block, scores, ranks).map(
    ({ method, isReference, against, meanRank, beatVisible }) => [
      escapeMarkdown(method),
      ...(against === null
        ? [missing, missing, isReference ? 'reference' : 'no pair', missing]
        : [
            showEstimate(against.difference, formatDifference),
            escapeMarkdown(formatP(against.adjustedP)),
            escapeMarkdown(describeDecision(against)),
            describeOutcomes(against),
          ]),
      ...(ranks ? [meanRank?.toFixed(2) ?? missing] : []),
      escapeMarkdown(describeShare(beatVisible)),
    ],
  );
  return [`Against ${escapeMarkdown(block.method)}, by ${block.score}:`, pipeTable(header, rows)];
}

function sharedCells(scores: MethodScores | OverallScores): string[] {
  const { lift, optimism, failures, cells, distinct, seconds } = scores;
  return [
    showEstimate(lift, formatDifference),
    optimism === null ? missing : showEstimate(optimism, formatDifference),
    `${failures}/${cells}`,
    distinct === null ? missing : formatCount(distinct),
    seconds === null ? missing : escapeMarkdown(formatSeconds(seconds)),
  ];
}

function lineToBeat(best: readonly Estimate[]): string[] {
  return [`**${bestVisibleLabel}** (line to beat)`, ...best.map((it) => showEstimate(it, formatScore))];
}

function pipeTable(header: readonly string[], rows: readonly string[][]): string {
  const lines = [
    header,
    header.map((_, column) => (column === 0 ? ':---' : '---:')),
    ...rows.map((row) => header.map((_, column) => row[column] ?? missing)),
  ];
  return lines.map((cells) => `| ${cells.join(' | ')} |`).join('\n');
}

function showEstimate({ value, interval }: Estimate, format: (value: number) => string): string {
  if (interval === null) return format(value);
  return `${format(value)} \\[${format(interval.low)}, ${format(interval.high)}\\]`;
}

function noteBlocks({ fooled, failed, incomplete }: Notes): string[] {
  const kinds: [string, readonly Note[]][] = [
    ['Fooled by its own model', fooled],
    ['Failed', failed],
    ['Not finished', incomplete],
  ];
  return kinds.flatMap(([title, notes]) =>
    notes.length === 0
      ? []
      : [`## ${title}`, notes.map(({ text }) => `- ${escapeMarkdown(text)}.`).join('\n')],
  );
}

function footBlocks({ columns, sweeps, intervals, comparison, failures, seeds, version }: Foot): string[] {
  const spread = seeds.least === seeds.most ? `${seeds.most}` : `${seeds.least} to ${seeds.most}`;
  const lines = [
    ...columns.map(({ column, meaning }) => `${column}: ${meaning}.`),
    `Seeds for each task: ${spread}.`,
    ...sweeps,
    ...intervals,
    ...comparison,
    failures,
    `Made by onebatch ${version}.`,
  ];
  return ['## How to read this', lines.map((line) => `- ${escapeMarkdown(line)}`).join('\n')];
}
