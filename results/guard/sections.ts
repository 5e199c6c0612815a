import type { CellRow } from '../../harness/row.js';

/** The cells of one task behind one curtain in one ledger. */
export interface LedgerSection {
  readonly task: string;
  readonly curtain: string;
  /** Different seeds, ascending. */
  readonly seeds: readonly number[];
  /** Rows by method label. */
  readonly rows: ReadonlyMap<string, readonly CellRow[]>;
}

/** Sorts the rows of the given methods into tasks and curtains, in the order in which these come; by `placeOf`. */
export function sectionsOf(
  rows: readonly CellRow[],
  methods: readonly string[],
): ReadonlyMap<string, LedgerSection> {
  const wanted = new Set(methods);
  const sections = new Map<string, { first: CellRow; seeds: Set<number>; rows: Map<string, CellRow[]> }>();
  for (const row of rows) {
    if (!wanted.has(row.method)) continue;
    const place = placeOf(row);
    const section = sections.get(place) ?? { first: row, seeds: new Set(), rows: new Map() };
    sections.set(place, section);
    section.seeds.add(row.seed);
    const cells = section.rows.get(row.method);
    if (cells) cells.push(row);
    else section.rows.set(row.method, [row]);
  }
  return new Map(
    [...sections].map(([place, { first, seeds, rows: cells }]) => {
      const { task, curtain } = first;
      return [place, { task, curtain, seeds: [...seeds].sort((a, b) => a - b), rows: cells }];
    }),
  );
}

/** One text for a task behind a curtain. */
export function placeOf({ task, curtain }: { readonly task: string; readonly curtain: string }): string {
  return JSON.stringify([task, curtain]);
}
