import type { Comparison } from '../comparison.js';
import type { Estimate } from '../estimate.js';
import { formatDifference, formatP, formatScore, missing } from '../format-number.js';
import type { Overall, OverallScores } from '../overall.js';
import type { Ranks } from '../ranks.js';
import type { ReferenceBlock } from '../reference.js';
import type { MethodScores, Section } from '../section.js';
import { escapeLatex, latexNumber } from './latex-text.js';
import { describeTable } from './table-foot.js';
import {
  bestVisibleLabel,
  countAbove,
  describeDecision,
  describeOutcomes,
  describeSection,
  describeShare,
  describeTasks,
} from './words.js';

/** What a table's row holds of a method. */
interface Line {
  readonly method: string;
  readonly scores: MethodScores | OverallScores;
  readonly best: Estimate;
  readonly median: Estimate;
}

const preamble = [
  '\\documentclass{article}',
  '\\usepackage[a4paper,landscape,margin=15mm]{geometry}',
  '\\usepackage{booktabs}',
  '\\begin{document}',
];

/**
 * A comparison as a LaTeX document in ASCII that needs the package booktabs alone: a table for each section and one
 * over all tasks, each with a foot that lets it stand on its own.
 */
export function renderLatex(comparison: Comparison): string {
  const { sections, overall } = comparison;
  const tables = [
    ...sections.map((section) => sectionTable(comparison, section)),
    ...(overall === null ? [] : [overallTable(comparison, overall)]),
  ];
  return `${[...preamble, ...tables.flatMap((table) => [...table, '\\clearpage']), '\\end{document}'].join('\n')}\n`;
}

function sectionTable(comparison: Comparison, section: Section): string[] {
  const lines = section.methods.map((scores) => ({
    method: scores.method,
    scores,
    best: scores.best,
    median: scores.median,
  }));
  return tableOf({
    title: `${section.task}: ${describeSection(section).join(', ')}`,
    lines,
    bestVisible: section.bestVisible,
    reference: section.reference,
    ranks: null,
    feet: [describeTable(comparison, section)],
  });
}

function overallTable(comparison: Comparison, overall: Overall): string[] {
  const lines = overall.methods.map((scores) => ({
    method: scores.method,
    scores,
    best: scores.best.mean,
    median: scores.median.mean,
  }));
  const ranked = comparison.foot.comparison.filter((line) => line.startsWith('rank:'));
  return tableOf({
    title: `All tasks: ${describeTasks(comparison.sections)}, mean of the tasks' means`,
    lines,
    bestVisible: overall.bestVisible.mean,
    reference: overall.reference,
    ranks: overall.ranks,
    feet: [describeTable(comparison, overall), ...(overall.ranks === null ? [] : ranked)],
  });
}

function tableOf(table: {
  readonly title: string;
  readonly lines: readonly Line[];
  readonly bestVisible: Estimate;
  readonly reference: ReferenceBlock | null;
  readonly ranks: Ranks | null;
  readonly feet: readonly string[];
}): string[] {
  const { lines, bestVisible, reference, ranks } = table;
  const tested = reference === null ? [] : ['Difference', '$p$', 'Verdict', 'Won/tied/lost'];
  const head = ['Method', 'Best', 'Median', ...tested, ...(ranks ? ['Rank'] : []), 'Beat visible', 'Failed'];
  const rows = lines.map((line) => [
    escapeLatex(line.method),
    showEstimate(line.best, formatScore),
    showEstimate(line.median, formatScore),
    ...(reference === null ? [] : testCells(line.method, reference)),
    ...(ranks === null ? [] : [rankOf(line.method, ranks)]),
    escapeLatex(describeShare(line.scores.beatVisible)),
    `${line.scores.failures}/${line.scores.cells}`,
  ]);
  const place = countAbove(
    lines.map(({ best }) => best.value),
    bestVisible.value,
  );
  const beat = [`\\emph{${bestVisibleLabel}}`, showEstimate(bestVisible, formatScore)];
  const columns = head.map((name) => (name === 'Method' || name === 'Verdict' ? 'l' : 'r')).join('');
  return [
    '\\begin{table}[htbp]',
    '\\centering',
    '\\footnotesize',
    `\\caption{${escapeLatex(table.title)}}`,
    `\\begin{tabular}{${columns}}`,
    '\\toprule',
    `${head.join(' & ')} \\\\`,
    '\\midrule',
    ...rows
      .toSpliced(place, 0, [...beat, ...head.slice(beat.length).map(() => '')])
      .map((cells) => `${cells.join(' & ')} \\\\`),
    '\\bottomrule',
    '\\end{tabular}',
    ...table.feet.map((foot) => `\\par\\smallskip\\parbox{0.95\\linewidth}{${escapeLatex(foot)}}`),
    '\\end{table}',
  ];
}

function testCells(method: string, reference: ReferenceBlock): string[] {
  if (method === reference.method) return ['', '', 'reference', ''];
  const against = reference.methods.find((it) => it.method === method);
  if (against === undefined) return [missing, missing, 'no pair', missing].map(escapeLatex);
  return [
    showEstimate(against.difference, formatDifference),
    escapeLatex(formatP(against.adjustedP)),
    escapeLatex(describeDecision(against)),
    describeOutcomes(against),
  ];
}

function rankOf(method: string, ranks: Ranks): string {
  return ranks.methods.find((it) => it.method === method)?.meanRank.toFixed(2) ?? escapeLatex(missing);
}

function showEstimate({ value, interval }: Estimate, format: (value: number) => string): string {
  const bounds = interval === null ? '' : ` [${format(interval.low)}, ${format(interval.high)}]`;
  return latexNumber(`${format(value)}${bounds}`);
}
