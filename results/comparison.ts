import { rootStream } from '../harness/random.js';
import type { CellRow } from '../harness/row.js';
import { countLooks } from './decide-at-looks.js';
import { intervalLevel } from './estimate.js';
import { type Foot, writeFoot } from './foot.js';
import { type Notes, takeNotes } from './notes.js';
import { defaultResamples, type Overall, scoreOverall, Totals } from './overall.js';
import { defaultMargin, type PairedScore } from './paired.js';
import { type Against, chooseReference } from './reference.js';
import { type PlanOrder, sortCells } from './scores.js';
import { type Section, scoreSection } from './section.js';
import type { SweepChoices } from './sweep.js';
import { defaultAlpha } from './verdict.js';

/**
 * What a ledger says of its methods: numbers, intervals and plain facts. It holds nothing but what JSON can hold, and
 * nothing of how it is shown.
 */
export interface Comparison {
  /** The program's version. */
  readonly version: string;
  /** Confidence of all intervals. */
  readonly level: number;
  /** Seed of the bootstraps and drawn sign patterns. */
  readonly seed: number;
  /** What methods are held against, and how. */
  readonly against: Against;
  /** How settings were chosen; null where the plan has no sweep. */
  readonly sweeps: SweepChoices | null;
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
  /** Resamples of each interquartile mean; 2,000 unless given. */
  readonly resamples?: number;
  /** The reference method's label; `repeat-best` unless given, or the first where the ledger does not hold that. */
  readonly against?: string | undefined;
  /** Score that methods are held against the reference by; `best` unless given. */
  readonly score?: PairedScore | undefined;
  /** Largest difference without practical meaning, above 0; 0.02 unless given. */
  readonly margin?: number | undefined;
  /** Numbers of seeds, ascending, after which verdicts were looked at while seeds were added: a plan's `looks`. */
  readonly looks?: readonly number[] | undefined;
  /** How settings were chosen, where the rows are what `chooseSettings` left to report. */
  readonly sweeps?: SweepChoices | null;
}

/**
 * Compares the methods of a ledger. The result does not depend on the order of the rows, and the numbers of a method
 * do not depend on which other methods the ledger holds, but for its rank and what Holm's correction makes of its p.
 *
 * @throws OnebatchError (`bad-ledger`) for rows that can't be compared: see `sortCells`; (`bad-input`) for a reference
 * that the ledger does not hold.
 */
export function compareRows(rows: readonly CellRow[], options: CompareOptions): Comparison {
  const { version, seconds = new Map(), seed = 0, order, resamples = defaultResamples, looks } = options;
  const { sweeps = null } = options;
  const cells = sortCells(rows, order);
  const against = {
    method: chooseReference(cells, options.against),
    score: options.score ?? 'best',
    margin: options.margin ?? defaultMargin,
    alpha: defaultAlpha,
    looks: looks === undefined ? null : { planned: looks, made: countLooks(cells, looks) },
  };
  const totals = new Totals();
  const scoring = {
    seconds,
    resamples,
    stream: rootStream(seed).split('comparison'),
    against,
    ...(cells.length > 1 ? { total: totals.collect } : {}),
  };
  const sections = cells.map((section) => scoreSection(section, scoring));
  const overall = cells.length > 1 ? scoreOverall(cells, sections, totals, scoring) : null;
  return {
    version,
    level: intervalLevel,
    seed,
    against,
    sweeps,
    sections,
    overall,
    notes: takeNotes(cells, sections, overall),
    foot: writeFoot(sections, overall, { version, resamples, against, sweeps }),
  };
}
