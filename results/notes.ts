import type { Estimate } from './estimate.js';
import { formatDifference, formatScore, supportedDecimals } from './format-number.js';
import type { Overall, OverallScores } from './overall.js';
import type { SectionCells } from './scores.js';
import type { MethodScores, Section } from './section.js';

/** One fact computed from the rows, in plain words. */
export interface Note {
  /** The task and curtain it is about; null for all tasks together. */
  readonly task: string | null;
  readonly curtain: string | null;
  /** The methods it names, the one it is about first. */
  readonly methods: readonly string[];
  readonly text: string;
}

/** What stands out, by kind. */
export interface Notes {
  /** For each task, the methods whose interval of the lift lies above 0. */
  readonly better: readonly Note[];
  /** On each task the method that believed most above the truth, where that did not pay. */
  readonly fooled: readonly Note[];
  /** Methods with failed cells, and the reasons. */
  readonly failed: readonly Note[];
  /** Methods that lack some of the seeds or tasks, and so can't be compared yet. */
  readonly incomplete: readonly Note[];
}

/** Differences below this are too small to have fooled anybody: the default margin of a real difference. */
const margin = 0.02;

/** Collects what stands out in a comparison. */
export function takeNotes(
  cells: readonly SectionCells[],
  sections: readonly Section[],
  overall: Overall | null,
): Notes {
  const place = (section: Pick<Section, 'task' | 'curtain'>): string => {
    const curtains = sections.filter(({ task }) => task === section.task).length;
    return curtains > 1 ? `${section.task} behind ${section.curtain}` : section.task;
  };
  return {
    better: [
      ...sections.flatMap((section) => noteBetter(section, section.methods, place(section))),
      ...noteBetter({ task: null, curtain: null }, overall?.methods ?? [], 'the mean of all tasks'),
    ],
    fooled: sections.flatMap((section) => noteFooled(section, place(section))),
    failed: cells.flatMap((section) => noteFailed(section, place(section))),
    incomplete: [
      ...sections.flatMap((section) => noteUnfinished(section, place(section))),
      ...(overall === null ? [] : noteAbsent(overall)),
    ],
  };
}

function noteBetter(
  where: { readonly task: string | null; readonly curtain: string | null },
  methods: readonly (MethodScores | OverallScores)[],
  place: string,
): Note[] {
  const better = methods.filter(({ lift }) => lift.interval !== null && lift.interval.low > 0);
  if (better.length === 0) return [];
  const list = better.map(({ method, lift }) => `${method} ${describe(lift, formatDifference)}`).join(', ');
  const text = `interval of the lift above 0 on ${place}: ${list}`;
  return [{ task: where.task, curtain: where.curtain, methods: better.map(({ method }) => method), text }];
}

/** An estimate with its interval, as in "0.21 [0.15, 0.26]". */
function describe(
  { value, interval }: Estimate,
  format: (value: number, decimals: number) => string,
): string {
  const decimals = supportedDecimals(interval);
  if (interval === null) return format(value, decimals);
  return `${format(value, decimals)} [${format(interval.low, decimals)}, ${format(interval.high, decimals)}]`;
}

function noteFooled({ task, curtain, methods }: Section, place: string): Note[] {
  const winner = methods[0]!;
  const [fooled] = methods
    .filter(
      ({ optimism, lift, best }) =>
        optimism !== null &&
        optimism.value >= margin &&
        optimism.interval !== null &&
        optimism.interval.low > 0 &&
        (lift.value <= 0 || best.value <= winner.best.value - margin),
    )
    .sort((a, b) => b.optimism!.value - a.optimism!.value);
  if (fooled === undefined) return [];
  const belief = `${fooled.method} believed its batch ${describe(fooled.optimism!, formatScore)} above the truth on ${place}`;
  const believers = fooled.optimism!.n;
  const count = believers < fooled.cells ? ` (${believers} of ${fooled.cells} cells stated a belief)` : '';
  return [{ task, curtain, methods: [fooled.method], text: `${belief}${count}, ${outcome(fooled, winner)}` }];
}

function outcome({ lift, best }: MethodScores, winner: MethodScores): string {
  const short = formatScore(-lift.value, supportedDecimals(lift.interval));
  if (lift.value < 0 && Number(short) !== 0)
    return `and its best design fell ${short} short of the best visible one on average`;
  if (lift.value <= 0) return 'and its best design was no better than the best visible one on average';
  const bests = [winner, { best }].map((it) => formatScore(it.best.value, supportedDecimals(best.interval)));
  return `and ${winner.method} found better designs on average: best ${bests.join(' against ')}`;
}

function noteFailed({ task, curtain, methods }: SectionCells, place: string): Note[] {
  return methods.flatMap(({ method, rows }) => {
    const reasons = new Map<string, number>();
    for (const { status, reason } of rows)
      if (status === 'failed') reasons.set(reason, (reasons.get(reason) ?? 0) + 1);
    if (reasons.size === 0) return [];
    const failures = [...reasons.values()].reduce((sum, count) => sum + count, 0);
    const [reason, count] = [...reasons].sort((a, b) => b[1] - a[1])[0]!;
    const others = failures > count ? `; ${failures - count} for other reasons` : '';
    const text = `${method} failed ${failures} of ${rows.length} cells on ${place}: ${reason.replace(/\.$/, '') || 'no reason given'}${others}`;
    return [{ task, curtain, methods: [method], text }];
  });
}

function noteUnfinished({ task, curtain, seeds, methods }: Section, place: string): Note[] {
  return methods
    .filter(({ cells }) => cells < seeds)
    .map(({ method, cells }) => ({
      task,
      curtain,
      methods: [method],
      text: `${method} has ${cells} of ${seeds} seeds on ${place}, so its means are not over the same pools as the others'`,
    }));
}

function noteAbsent({ sections, methods }: Overall): Note[] {
  return methods
    .filter((method) => method.sections < sections)
    .map(({ method, sections: present }) => ({
      task: null,
      curtain: null,
      methods: [method],
      text: `${method} has cells on ${present} of ${sections} tasks; its means over all tasks leave the others out`,
    }));
}
