import type { Estimate } from '../estimate.js';
import { formatScore, missing } from '../format-number.js';
import { padTextEnd, padTextStart, textWidth } from './text-width.js';

/** A column of text: a head and cells that are all equally wide. */
export interface TextColumn {
  readonly head: string;
  readonly cells: readonly string[];
  readonly width: number;
}

/** How much room numbers get. */
export interface NumberStyle {
  readonly decimals: number;
  /** Decimals of numbers too large to be written out. */
  readonly exponentDecimals: number;
  /** What stands between the bounds of an interval. */
  readonly between: string;
}

/** Words, aligned at their start. */
export function wordColumn(head: string, words: readonly string[]): TextColumn {
  const width = widest([head, ...words]);
  return { head: padTextEnd(head, width), cells: words.map((word) => padTextEnd(word, width)), width };
}

/** Numbers, aligned at their end. */
export function numberColumn(head: string, numbers: readonly string[]): TextColumn {
  const width = widest([head, ...numbers]);
  return {
    head: padTextStart(head, width),
    cells: numbers.map((number) => padTextStart(number, width)),
    width,
  };
}

/**
 * Estimates with their intervals, as in "0.812 [0.771, 0.843]", each of the three numbers aligned at its end. Without
 * any interval the column holds the values alone. A cell that is null stays empty.
 */
export function estimateColumn(
  name: string,
  estimates: readonly (Estimate | null)[],
  { decimals, exponentDecimals, between }: NumberStyle,
  format: typeof formatScore = formatScore,
): TextColumn {
  const show = (value: number | undefined): string =>
    value === undefined ? '' : format(value, decimals, exponentDecimals);
  const values = estimates.map((estimate) => show(estimate?.value));
  const lows = estimates.map((estimate) => show(estimate?.interval?.low));
  const highs = estimates.map((estimate) => show(estimate?.interval?.high));
  if (widest(lows) === 0) return numberColumn(name, values);
  const width = widest([name, ...values]);
  const cells = estimates.map((estimate, i) => {
    if (estimate === null) return '';
    const low = padTextStart(lows[i]!, widest(lows));
    const high = padTextStart(highs[i]!, widest(highs));
    const bounds = estimate.interval === null ? missing : `[${low}${between}${high}]`;
    return `${padTextStart(values[i]!, width)} ${bounds}`;
  });
  return wordColumn(`${padTextStart(name, width)} [95 %]`, cells);
}

function widest(texts: readonly string[]): number {
  return texts.reduce((most, text) => Math.max(most, textWidth(text)), 0);
}
