import { rootStream } from '../harness/random.js';
import type { CellRow } from '../harness/row.js';
import { intervalLevel } from './estimate.js';
import { type Foot, writeFoot } from './foot.js';
import { type Notes, takeNotes } from './notes.js';
import { type Overall, scoreOverall } from './overall.js';
import { type PlanOrder, sortCells } from './scores.js';
import { type Section, scoreSection } from './section.js';
import { defaultResamples } from './statistics/bca.js';

/**
 * What a ledger says of its methods: numbers, intervals and plain facts. It holds nothing but what JSON can hold, and
 * nothing of how it is shown.
 */
export interface Comparison {
  /** The program's version. */
  readonly version: string;
  /** Confidence of all intervals. */
  readonly level: number;
  /** Seed of the bootstraps. */
  readonly seed: number;
  /** One for each task behind each curtain. */
  readonly sections: readonly Section[];
  /** Absent (null) where there is only one section. */
  readonly overall: Overall | null;
  readonly notes: Notes;
  readonly foot: Foot;
}

/** What is needed beside the rows. */
export interface CompareOptions {
  /** The program's version, for the foot. */
  readonly version: string;
  /** Wall-clock seconds of each cell, by `cellId`. */
  readonly seconds?: ReadonlyMap<string, number>;
  /** Seed of the bootstraps; 0 unless given. */
  readonly seed?: number;
  /** The plan's order of tasks and methods; by name unless given. */
  readonly order?: PlanOrder;
  /** Resamples of each bootstrap; 10,000 unless given. */
  readonly resamples?: number;
}

/**
 * Compares the methods of a ledger. The result does not depend on the order of the rows, and the numbers of a method
 * do not depend on which other methods the ledger holds.
 *
 * @throws OnebatchError (`bad-ledger`) for rows that can't be compared: see `sortCells`.
 */
export function compareRows(rows: readonly CellRow[], options: CompareOptions): Comparison {
  const { version, seconds = new Map(), seed = 0, order, resamples = defaultResamples } = options;
  const cells = sortCells(rows, order);
  const scoring = { seconds, resamples, stream: rootStream(seed).split('comparison') };
  const sections = cells.map((section) => scoreSection(section, scoring));
  const overall = cells.length > 1 ? scoreOverall(cells, scoring) : null;
  return {
    version,
    level: intervalLevel,
    seed,
    sections,
    overall,
    notes: takeNotes(cells, sections, overall),
    foot: writeFoot(sections, overall, { version, resamples }),
  };
}
