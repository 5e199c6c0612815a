import { formatDifference, formatP, missing } from '../format-number.js';
import { estimateOf, type ReferenceRow } from './reference-rows.js';
import { estimateColumn, numberColumn, type TextColumn, wordColumn } from './text-columns.js';
import { oneLine, textWidth, truncateText } from './text-width.js';
import { describeDecision, describeOutcomes, describeShare } from './words.js';

/** From roomy to cramped; the first that fits is taken. */
const styles = [
  { decimals: 3, exponentDecimals: 1, between: ', ', gap: 2, intervalOfShare: true },
  { decimals: 2, exponentDecimals: 1, between: ', ', gap: 2, intervalOfShare: true },
  { decimals: 2, exponentDecimals: 1, between: ', ', gap: 2, intervalOfShare: false },
  { decimals: 2, exponentDecimals: 0, between: ' ', gap: 1, intervalOfShare: false },
];

const labelWidth = 30;

/** The lines of a table of all methods against the reference, its head first; none is wider than `width`. */
export function layOutReference(rows: readonly ReferenceRow[], width: number): string[] {
  const labels = rows.map(({ method }) => oneLine(method));
  const widest = Math.min(labelWidth, Math.max(...labels.map(textWidth)));
  const laidOut = styles.map((style) => ({ style, columns: columnsOf(rows, style) }));
  const chosen =
    laidOut.find(({ style, columns }) => widest + style.gap + totalWidth(columns, style.gap) <= width) ??
    laidOut.at(-1)!;
  const { columns, style } = chosen;
  const room = Math.min(widest, width - style.gap - totalWidth(columns, style.gap));
  const name = wordColumn(
    truncateText('method', room),
    labels.map((label) => truncateText(label, room)),
  );
  const all = [name, ...columns];
  const space = ' '.repeat(style.gap);
  return [
    all.map(({ head }) => head).join(space),
    ...rows.map((_, i) => all.map(({ cells }) => cells[i]!).join(space)),
  ].map((line) => line.trimEnd());
}

function columnsOf(rows: readonly ReferenceRow[], style: (typeof styles)[number]): TextColumn[] {
  const ranked = rows.some(({ meanRank }) => meanRank !== null);
  return [
    estimateColumn('difference', rows.map(estimateOf), style, formatDifference),
    numberColumn(
      'p',
      rows.map(({ against, isReference }) => {
        if (against !== null) return formatP(against.adjustedP);
        return isReference ? '' : missing;
      }),
    ),
    wordColumn(
      'verdict',
      rows.map(({ against, isReference }) => {
        if (against !== null) return describeDecision(against);
        return isReference ? 'reference' : 'no pair';
      }),
    ),
    numberColumn(
      'w/t/l',
      rows.map(({ against }) => (against === null ? '' : describeOutcomes(against))),
    ),
    ...(ranked
      ? [
          numberColumn(
            'rank',
            rows.map(({ meanRank }) => meanRank?.toFixed(1) ?? missing),
          ),
        ]
      : []),
    numberColumn(
      'beat visible',
      rows.map(({ beatVisible }) => {
        const text = describeShare(beatVisible);
        return style.intervalOfShare ? text : text.slice(0, text.indexOf(' ['));
      }),
    ),
  ];
}

function totalWidth(columns: readonly TextColumn[], gap: number): number {
  return columns.reduce((sum, { width }) => sum + width, 0) + gap * (columns.length - 1);
}
