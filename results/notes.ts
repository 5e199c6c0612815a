import type { Estimate } from './estimate.js';
import { formatDifference, formatScore, supportedDecimals } from './format-number.js';
import type { Overall } from './overall.js';
import type { AgainstReference, ReferenceBlock } from './reference.js';
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
  /** For each task, and for all together, the verdicts against the reference. */
  readonly verdicts: readonly Note[];
  /** On each task the method, other than the reference, that believed most above the truth, where that did not pay. */
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
    verdicts: [
      ...sections.flatMap((section) => noteVerdicts(section, section.reference, place(section))),
      ...noteVerdicts({ task: null, curtain: null }, overall?.reference ?? null, 'the mean of all tasks'),
    ],
    fooled: sections.flatMap((section) => noteFooled(section, place(section))),
    failed: cells.flatMap((section) => noteFailed(section, place(section))),
    incomplete: [
      ...sections.flatMap((section) => noteUnfinished(section, place(section))),
      ...(overall === null ? [] : noteAbsent(overall)),
    ],
  };
}

/** Verdicts of a table in one line, such as "against repeat-best on ackley: helps a +0.07 [+0.02, +0.12]; undecided: all others". */
function noteVerdicts(
  where: { readonly task: string | null; readonly curtain: string | null },
  reference: ReferenceBlock | null,
  place: string,
): Note[] {
  if (reference === null) return [];
  const { methods } = reference;
  const decided = (['helps', 'hurts', 'no real difference'] as const).flatMap((verdict) => {
    const those = methods.filter((it) => it.verdict === verdict);
    const list = those.map(({ method, difference }) => `${method} ${describe(difference, formatDifference)}`);
    return those.length === 0
      ? []
      : [`${verdict}${verdict === 'no real difference' ? ':' : ''} ${list.join(', ')}`];
  });
  const open = methods.filter(({ verdict }) => verdict === 'undecided');
  const text = [...decided, ...noteUndecided(open, methods.length)].join('; ');
  return [
    {
      task: where.task,
      curtain: where.curtain,
      methods: methods.map(({ method }) => method),
      text: `against ${reference.method} on ${place}: ${text}`,
    },
  ];
}

function noteUndecided(open: readonly AgainstReference[], all: number): string[] {
  if (open.length === 0) return [];
  const needed = open.flatMap(({ method, seedsNeeded }) =>
    seedsNeeded?.kind === 'about' ? [{ method, seeds: seedsNeeded.seeds }] : [],
  );
  const [nearest] = needed.sort((a, b) => a.seeds - b.seeds);
  const hint =
    nearest === undefined ? '' : `, the nearest (${nearest.method}) at about ${nearest.seeds} seeds`;
  return [`undecided: ${open.length === all ? `all ${all}` : `${open.length} of ${all}`}${hint}`];
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

function noteFooled({ task, curtain, methods, reference }: Section, place: string): Note[] {
  const winner = methods[0]!;
  const [fooled] = methods
    .filter(
      ({ method, optimism, lift, best }) =>
        method !== reference?.method &&
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
