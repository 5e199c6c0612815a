import { OnebatchError } from '../harness/errors.js';
import { type CellRow, cellId } from '../harness/row.js';

/** The cells of one method on one task behind one curtain, in order of seeds. */
export interface MethodCells {
  /** The method's label; with the settings' hash where the ledger holds the label with several settings. */
  readonly method: string;
  readonly settings: string;
  readonly rows: readonly CellRow[];
}

/** All cells of one task behind one curtain. */
export interface SectionCells {
  readonly task: string;
  readonly curtain: string;
  /** Different seeds, ascending. */
  readonly seeds: readonly number[];
  /** True normalized score of the best visible design for each seed. */
  readonly bestVisible: readonly number[];
  readonly methods: readonly MethodCells[];
}

/** The order in which a plan names its tasks and methods. */
export interface PlanOrder {
  readonly tasks: readonly string[];
  readonly methods: readonly string[];
}

/** Scores of one seed that differ by more than this share were not measured on the same pool. */
const sameScore = 1e-9;

/**
 * Sorts a ledger's rows into tasks and curtains, methods and seeds. The result depends on the rows alone, not on the
 * order they come in: tasks and methods stand in the plan's order, those it does not name after it by name.
 *
 * @throws OnebatchError (`bad-ledger`) for no rows, a cell that occurs twice, a score that isn't a finite number, or
 * methods of one seed that did not face the same best visible design.
 */
export function sortCells(
  rows: readonly CellRow[],
  order: PlanOrder = { tasks: [], methods: [] },
): SectionCells[] {
  if (rows.length === 0)
    throw new OnebatchError(
      'bad-ledger',
      'the ledger holds no finished cell, so there is nothing to compare',
    );
  checkRows(rows);
  const label = labelMethods(rows);
  return groupBy(rows, ({ task, curtain }) => JSON.stringify([task, curtain]))
    .map((sectionRows) => {
      const methods = groupBy(sectionRows, label).map((cells) => ({
        method: label(cells[0]!),
        settings: cells[0]!.settings,
        rows: [...cells].sort((a, b) => a.seed - b.seed),
      }));
      return {
        task: sectionRows[0]!.task,
        curtain: sectionRows[0]!.curtain,
        ...seedsOf(sectionRows),
        methods: methods.sort(
          (a, b) =>
            byPlan(order.methods, a.rows[0]!.method, b.rows[0]!.method) || compareText(a.method, b.method),
        ),
      };
    })
    .sort((a, b) => byPlan(order.tasks, a.task, b.task) || compareText(a.curtain, b.curtain));
}

function checkRows(rows: readonly CellRow[]): void {
  const seen = new Set<string>();
  for (const row of rows) {
    const id = cellId(row);
    if (seen.has(id)) throw new OnebatchError('bad-ledger', `cell ${id} occurs twice in the ledger`);
    seen.add(id);
    for (const score of ['best', 'median', 'bestVisible', 'lift', 'optimism'] as const) {
      const value = row[score];
      if (value !== undefined && !Number.isFinite(value))
        throw new OnebatchError('bad-ledger', `cell ${id} has ${score} ${value}, not a finite number`);
    }
  }
}

function labelMethods(rows: readonly CellRow[]): (row: CellRow) => string {
  const settings = new Map<string, Set<string>>();
  for (const row of rows) {
    const known = settings.get(row.method);
    if (known) known.add(row.settings);
    else settings.set(row.method, new Set([row.settings]));
  }
  return (row) =>
    settings.get(row.method)!.size > 1 ? `${row.method} (settings ${row.settings})` : row.method;
}

function seedsOf(rows: readonly CellRow[]): Pick<SectionCells, 'seeds' | 'bestVisible'> {
  const first = new Map<number, CellRow>();
  const order = (a: CellRow, b: CellRow): number =>
    a.seed - b.seed || compareText(a.method, b.method) || compareText(a.settings, b.settings);
  for (const row of [...rows].sort(order)) {
    const other = first.get(row.seed);
    if (other === undefined) first.set(row.seed, row);
    else checkPaired(other, row);
  }
  return { seeds: [...first.keys()], bestVisible: [...first.values()].map((row) => row.bestVisible) };
}

function checkPaired(a: CellRow, b: CellRow): void {
  for (const score of ['bestVisible', 'floor', 'top'] as const) {
    if (Math.abs(a[score] - b[score]) > sameScore * Math.max(1, Math.abs(a[score])))
      throw new OnebatchError(
        'bad-ledger',
        `"${a.method}" and "${b.method}" did not face the same pool on ${a.task}, seed ${a.seed}: ${score} ${a[score]} and ${b[score]}; compare cells of one plan`,
      );
  }
}

function groupBy<T>(items: readonly T[], key: (item: T) => string): T[][] {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const name = key(item);
    const group = groups.get(name);
    if (group) group.push(item);
    else groups.set(name, [item]);
  }
  return [...groups.values()];
}

function byPlan(names: readonly string[], a: string, b: string): number {
  const place = (name: string): number => (names.includes(name) ? names.indexOf(name) : names.length);
  return place(a) - place(b) || compareText(a, b);
}

function compareText(a: string, b: string): number {
  if (a === b) return 0;
  return a < b ? -1 : 1;
}
