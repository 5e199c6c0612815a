import { styleText } from 'node:util';
import type { Comparison } from '../comparison.js';
import type { Note, Notes } from '../notes.js';
import type { OverallScores } from '../overall.js';
import type { Ranks } from '../ranks.js';
import type { ReferenceBlock } from '../reference.js';
import type { MethodScores } from '../section.js';
import { referenceRows } from './reference-rows.js';
import { layOutOverall, layOutSections, type TextTable } from './terminal-layout.js';
import { layOutReference } from './terminal-reference.js';
import { oneLine, truncateText, wrapText } from './text-width.js';
import { bestVisibleLabel, describeSection, describeTasks, describeTop } from './words.js';

/** Columns that the terminal's tables never exceed. */
export const terminalWidth = 100;

/** How a comparison is shown in a terminal. */
export interface TerminalOptions {
  /** Whether headings are bold and the foot dim; plain text unless true. */
  readonly style?: boolean;
  /** Whether each task has its table against the reference, and not a line of verdicts only. */
  readonly full?: boolean;
}

type Emphasis = (kind: 'bold' | 'dim', line: string) => string;

/**
 * A comparison for the terminal: a table for each section, all with the same columns, one over all tasks, methods
 * against the reference, and the foot. No line is wider than 100 columns.
 */
export function renderTerminal(comparison: Comparison, options: TerminalOptions = {}): string {
  const { sections, overall, notes } = comparison;
  const full = options.full === true || sections.length === 1;
  const emphasize: Emphasis = (kind, line) =>
    options.style === true ? styleText(kind, line, { validateStream: false }) : line;
  const tables = layOutSections(sections, terminalWidth);
  const blocks = [
    introduce(sections.some(({ bestVisible }) => bestVisible.interval !== null)),
    ...sections.map((section, i) => [
      ...headSection(`${section.task} · ${describeTop(section.top)}`, describeSection(section), emphasize),
      ...drawTable(tables[i]!, emphasize),
      ...(full ? drawReference(section.reference, section.methods, null, emphasize) : []),
      ...listNotes(
        full ? { ...notes, verdicts: [] } : notes,
        ({ task, curtain }) => task === section.task && curtain === section.curtain,
      ),
    ]),
    ...(overall === null
      ? []
      : [
          [
            ...headSection(
              'All tasks',
              [
                describeTasks(sections),
                "mean of the tasks' means",
                'IQM: interquartile mean of best over all cells',
              ],
              emphasize,
            ),
            ...drawTable(layOutOverall(overall, terminalWidth), emphasize),
            ...drawReference(overall.reference, overall.methods, overall.ranks, emphasize),
            ...listNotes({ ...notes, verdicts: [] }, ({ task }) => task === null),
          ],
        ]),
    explain(comparison).map((line) => emphasize('dim', line)),
  ];
  return `${blocks.map((lines) => lines.join('\n')).join('\n\n')}\n`;
}

function introduce(intervals: boolean): string[] {
  const brackets = intervals ? ' Brackets hold 95 % intervals.' : '';
  return wrapText(
    `True scores, 0 = worst design of the pool, 1 = top.${brackets} Methods above the line "${bestVisibleLabel}" found, on average, better designs than the table held.`,
    terminalWidth,
  );
}

function headSection(title: string, facts: readonly string[], emphasize: Emphasis): string[] {
  return [
    emphasize('bold', truncateText(oneLine(title), terminalWidth)),
    ...wrapText(oneLine(facts.join(' · ')), terminalWidth),
  ];
}

function drawTable({ head, rows, lineToBeat }: TextTable, emphasize: Emphasis): string[] {
  return [
    emphasize('bold', head.trimEnd()),
    ...rows.map((row, i) => (i === lineToBeat ? emphasize('bold', row.trimEnd()) : row.trimEnd())),
  ];
}

function drawReference(
  block: ReferenceBlock | null,
  scores: readonly (MethodScores | OverallScores)[],
  ranks: Ranks | null,
  emphasize: Emphasis,
): string[] {
  if (block === null) return [];
  const [head, ...lines] = layOutReference(referenceRows(block, scores, ranks), terminalWidth);
  const title = truncateText(oneLine(`Against ${block.method}, by ${block.score}:`), terminalWidth);
  return ['', title, emphasize('bold', head!), ...lines];
}

function listNotes(
  { verdicts, fooled, failed, incomplete }: Notes,
  wanted: (note: Note) => boolean,
): string[] {
  const lines = [
    ...verdicts.filter(wanted).map(({ text }) => `= ${text}`),
    ...fooled.filter(wanted).map(({ text }) => `! ${text}`),
    ...failed.filter(wanted).map(({ text }) => `x ${text}`),
    ...incomplete.filter(wanted).map(({ text }) => `? ${text}`),
  ].flatMap((line) => wrapText(oneLine(line), terminalWidth, '  '));
  return lines.length === 0 ? [] : ['', ...lines];
}

function explain({ foot }: Comparison): string[] {
  const columns = foot.columns.filter(({ column }) => column !== 'distinct' && column !== 'IQM');
  const width = Math.max(...columns.map(({ column }) => column.length));
  return [
    ...columns.map(({ column, meaning }) => `${column.padEnd(width)}  ${meaning}`),
    ...foot.sweeps,
    ...foot.intervals,
    ...foot.comparison,
    foot.failures,
    `onebatch ${foot.version}`,
  ].flatMap((line) => wrapText(oneLine(line), terminalWidth, '  '));
}
