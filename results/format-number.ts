/** What stands where there is no number. */
export const missing = '–';

/**
 * A score for reading, with at most `decimals` of them (1 to 3) and never more than four digits: 0.812, 12.34, 123.4,
 * 1.5e5 (from 1000 on, with `exponentDecimals`). A number that isn't finite is missing. No number rounds to a negative zero.
 */
export function formatScore(value: number, decimals = 3, exponentDecimals = 1): string {
  if (!Number.isFinite(value)) return missing;
  for (const [limit, lost] of [
    [10, 0],
    [100, 1],
    [1000, 2],
  ] as const) {
    const text = value.toFixed(Math.max(0, decimals - lost));
    if (Math.abs(Number(text)) < limit) return Number(text) === 0 ? text.replace('-', '') : text;
  }
  return value.toExponential(exponentDecimals).replace('e+', 'e');
}

/** As `formatScore`, with a plus before what is above 0: for differences. */
export function formatDifference(value: number, decimals = 3, exponentDecimals = 1): string {
  const text = formatScore(value, decimals, exponentDecimals);
  return Number(text) > 0 ? `+${text}` : text;
}

/** Decimals that an interval lets a score be given with in a text: 2, or 3 for an interval narrower than 0.02. */
export function supportedDecimals(interval: { readonly low: number; readonly high: number } | null): number {
  return interval !== null && interval.high - interval.low < 0.02 ? 3 : 2;
}

/** Seconds for reading: <0.1, 4.2, 123, 1.5e5. */
export function formatSeconds(seconds: number): string {
  if (seconds > 0 && seconds < 0.05) return '<0.1';
  if (seconds < 99.95) return seconds.toFixed(1);
  return seconds < 99_999.5 ? seconds.toFixed(0) : seconds.toExponential(1).replace('e+', 'e');
}

/** A count of designs for reading: 128, or 12.4 for a mean. */
export function formatCount(count: number): string {
  return Number(count.toFixed(1)) % 1 === 0 ? count.toFixed(0) : count.toFixed(1);
}

/** A p-value for reading: 0.034, <0.001; 1.000 stays. */
export function formatP(p: number): string {
  return p < 0.001 ? '<0.001' : p.toFixed(3);
}
