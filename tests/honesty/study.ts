import type { Stream } from '../../harness/random.js';
import type { TaskScores } from './score-table.js';
import type { Promised, Tally } from './tally.js';

/** A line of a table: what was asked, how often it came true, and what is promised. */
export interface Finding {
  readonly row: readonly string[];
  readonly tally: Tally;
  readonly promised: Promised;
  /** Further columns. */
  readonly more: readonly string[];
}

/** What a reader of a study's table is told. */
export interface StudyWords {
  readonly title: string;
  /** What was done. */
  readonly text: string;
  /** Headings of `Finding.row`, of the share, and of `Finding.more`. */
  readonly columns: {
    readonly row: readonly string[];
    readonly share: string;
    readonly more: readonly string[];
  };
}

/** A question that is put to simulated comparisons, in numbered parts that workers can take. */
export interface Study extends StudyWords {
  readonly parts: number;
  run(part: number, tools: Tools): Finding[];
}

export interface Tools {
  readonly scores: readonly TaskScores[];
  readonly stream: Stream;
  /** Share of the repetitions of the committed report, above 0. */
  readonly effort: number;
}

/** A study of parts that differ in what they ask. */
export function defineStudy<Part>(
  study: StudyWords & { readonly parts: readonly Part[]; run(part: Part, tools: Tools): Finding[] },
): Study {
  const { title, text, columns, parts, run } = study;
  return { title, text, columns, parts: parts.length, run: (part, tools) => run(parts[part]!, tools) };
}

/** Repetitions, at least 1. */
export function repeats(count: number, effort: number): number {
  return Math.max(1, Math.round(count * effort));
}

/** A share in percent with one decimal. */
export function percent(share: number): string {
  return `${(100 * share).toFixed(1)} %`;
}
