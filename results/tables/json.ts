import type { Comparison } from '../comparison.js';

/** A comparison as JSON: keys in the order of their types, two spaces, full precision, null where nothing is known. */
export function renderJson(comparison: Comparison): string {
  return `${JSON.stringify(comparison, null, 2)}\n`;
}
