import type { Estimate } from '../estimate.js';
import { formatDifference, formatScore, formatSeconds, missing } from '../format-number.js';
import type { Overall, OverallScores } from '../overall.js';
import type { MethodScores, Section } from '../section.js';
import {
  estimateColumn,
  type NumberStyle,
  numberColumn,
  type TextColumn,
  wordColumn,
} from './text-columns.js';
import { oneLine, textWidth, truncateText } from './text-width.js';
import { bestVisibleLabel, countAbove } from './words.js';

/** A table as lines of text. */
export interface TextTable {
  readonly head: string;
  readonly rows: readonly string[];
  /** Which row is that of best visible. */
  readonly lineToBeat: number;
}

/** One line of a table before it is laid out. */
interface Row {
  readonly label: string;
  /** What has an interval, in the table's order; the line to beat lacks the last of them. */
  readonly estimates: readonly Estimate[];
  /** What has none, in the table's order; empty for the line to beat. */
  readonly numbers: readonly ((style: NumberStyle) => string)[];
}

interface Heads {
  readonly estimates: readonly string[];
  readonly numbers: readonly string[];
}

interface Style extends NumberStyle {
  /** Spaces between columns. */
  readonly gap: number;
}

/** From roomy to cramped; the first that fits is taken. */
const styles: readonly Style[] = [
  { decimals: 3, exponentDecimals: 1, between: ', ', gap: 2 },
  { decimals: 2, exponentDecimals: 1, between: ', ', gap: 2 },
  { decimals: 2, exponentDecimals: 1, between: ' ', gap: 2 },
  { decimals: 2, exponentDecimals: 1, between: ' ', gap: 1 },
  { decimals: 2, exponentDecimals: 0, between: ' ', gap: 1 },
  { decimals: 1, exponentDecimals: 0, between: ' ', gap: 1 },
];

/** Labels are shown in full up to this width, and shortened further only where the numbers leave less. */
const labelWidth = 30;

/** Tables of all sections, one each, with the same columns; no line is wider than `width`, which is 100 or more. */
export function layOutSections(sections: readonly Section[], width: number): TextTable[] {
  const heads = { estimates: ['best', 'median'], numbers: ['lift', 'optimism', 'failed', 'seconds'] };
  const tables = sections.map(({ methods, bestVisible }) =>
    placeLine(
      methods.map((scores) => ({
        label: scores.method,
        estimates: [scores.best, scores.median],
        numbers: sharedNumbers(scores),
      })),
      [bestVisible],
    ),
  );
  return layOut(tables, heads, width);
}

/** The table over all tasks; no line is wider than `width`, which is 100 or more. */
export function layOutOverall({ methods, bestVisible }: Overall, width: number): TextTable {
  const heads = { estimates: ['best', 'IQM'], numbers: ['median', 'lift', 'optimism', 'failed', 'seconds'] };
  const rows = methods.map((scores) => ({
    label: scores.method,
    estimates: [scores.best.mean, scores.best.interquartileMean],
    numbers: [
      ({ decimals, exponentDecimals }: NumberStyle) =>
        formatScore(scores.median.mean.value, decimals, exponentDecimals),
      ...sharedNumbers(scores),
    ],
  }));
  return layOut([placeLine(rows, [bestVisible.mean, bestVisible.interquartileMean])], heads, width)[0]!;
}

function sharedNumbers(scores: MethodScores | OverallScores): Row['numbers'] {
  const { lift, optimism, failures, cells, seconds } = scores;
  return [
    ({ decimals, exponentDecimals }) => formatDifference(lift.value, decimals, exponentDecimals),
    ({ decimals, exponentDecimals }) =>
      optimism === null ? missing : formatDifference(optimism.value, decimals, exponentDecimals),
    () => `${failures}/${cells}`,
    () => (seconds === null ? missing : formatSeconds(seconds)),
  ];
}

function placeLine(rows: readonly Row[], bestVisible: readonly Estimate[]): Row[] {
  const above = countAbove(
    rows.map(({ estimates }) => estimates[0]!.value),
    bestVisible[0]!.value,
  );
  return rows.toSpliced(above, 0, { label: bestVisibleLabel, estimates: bestVisible, numbers: [] });
}

function layOut(tables: readonly Row[][], heads: Heads, width: number): TextTable[] {
  const all = tables.flat();
  const labels = all.map(({ label }) => oneLine(label));
  const widest = Math.min(labelWidth, Math.max(...labels.map(textWidth)));
  const fits = (style: Style): boolean =>
    widest + style.gap + totalWidth(scoreColumns(all, heads, style), style.gap) <= width;
  const style = styles.find(fits) ?? styles.at(-1)!;
  const columns = scoreColumns(all, heads, style);
  const room = Math.min(widest, width - style.gap - totalWidth(columns, style.gap));
  const method = wordColumn(
    truncateText('method', room),
    labels.map((label) => truncateText(label, room)),
  );
  return draw(tables, [method, ...columns], style.gap);
}

function scoreColumns(rows: readonly Row[], { estimates, numbers }: Heads, style: Style): TextColumn[] {
  return [
    ...estimates.map((head, k) =>
      estimateColumn(
        head,
        rows.map((row) => row.estimates[k] ?? null),
        style,
      ),
    ),
    ...numbers.map((head, k) =>
      numberColumn(
        head,
        rows.map((row) => row.numbers[k]?.(style) ?? ''),
      ),
    ),
  ];
}

function draw(tables: readonly Row[][], columns: readonly TextColumn[], gap: number): TextTable[] {
  const space = ' '.repeat(gap);
  let at = 0;
  return tables.map((rows) => {
    const from = at;
    at += rows.length;
    return {
      head: columns.map(({ head }) => head).join(space),
      rows: rows.map((row, i) => {
        const cells = columns.map((column) => column.cells[from + i]!);
        if (row.numbers.length > 0) return cells.join(space);
        const known = cells.slice(0, 1 + row.estimates.length).join(space);
        const rest = totalWidth(columns.slice(1 + row.estimates.length), gap);
        return `${known}${space}${`── line to beat ${'─'.repeat(rest)}`.slice(0, rest)}`;
      }),
      lineToBeat: rows.findIndex((row) => row.numbers.length === 0),
    };
  });
}

function totalWidth(columns: readonly TextColumn[], gap: number): number {
  return columns.reduce((sum, { width }) => sum + width, 0) + gap * (columns.length - 1);
}
