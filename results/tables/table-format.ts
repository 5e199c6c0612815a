import type { Comparison } from '../comparison.js';

/** One way to write a comparison as text. */
export interface TableFormat {
  /** What a person asks for it by. */
  readonly name: 'csv' | 'markdown' | 'json' | 'latex';
  /** The file that holds it, in the rehearsal's folder. */
  readonly file: string;
  render(comparison: Comparison): string | Promise<string>;
}
