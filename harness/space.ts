import { type Designs, rowView, zeros } from './designs.js';
import type { Stream } from './random.js';

/** A real-valued column: any value from `low` to `high`, both included. */
export interface ContinuousColumn {
  readonly kind: 'continuous';
  readonly name: string;
  readonly low: number;
  readonly high: number;
  readonly unit?: string;
}

/** A whole-number column: any integer from `low` to `high`, both included. */
export interface IntegerColumn {
  readonly kind: 'integer';
  readonly name: string;
  readonly low: number;
  readonly high: number;
  readonly unit?: string;
}

/** A column of unordered levels; a design holds the level's index. */
export interface CategoryColumn {
  readonly kind: 'category';
  readonly name: string;
  readonly levels: readonly string[];
}

export type Column = ContinuousColumn | IntegerColumn | CategoryColumn;

/** What a design is: ordered columns, each with its kind and its bounds or levels. */
export interface Space {
  readonly columns: readonly Column[];
}

/** A value that lies outside the space: which row and column, and why. */
export interface Breach {
  readonly row: number;
  readonly column: string;
  readonly value: number;
  readonly problem: string;
}

/**
 * Makes a space after checking it: at least one column, different names, finite bounds with low < high (whole
 * numbers for an integer column), at least two different levels.
 *
 * @throws RangeError naming the column at fault.
 */
export function makeSpace(columns: readonly Column[]): Space {
  if (columns.length === 0) throw new RangeError('a space needs at least one column');
  const names = new Set<string>();
  for (const column of columns) {
    if (names.has(column.name)) throw new RangeError(`two columns are named "${column.name}"`);
    names.add(column.name);
    checkColumn(column);
  }
  return { columns };
}

/** A space of `length` category columns `site1` … over one alphabet: a sequence. */
export function sequenceSpace(length: number, alphabet: readonly string[]): Space {
  return makeSpace(
    Array.from({ length }, (_, i) => ({ kind: 'category' as const, name: `site${i + 1}`, levels: alphabet })),
  );
}

/** How many different values a column can take; Infinity for a continuous one. */
export function countValues(column: Column): number {
  if (column.kind === 'category') return column.levels.length;
  return column.kind === 'integer' ? column.high - column.low + 1 : Number.POSITIVE_INFINITY;
}

/** Whether every column is a category. */
export function isDiscrete(space: Space): boolean {
  return space.columns.every((column) => column.kind === 'category');
}

/** A value drawn uniformly from one column. */
export function sampleColumn(column: Column, stream: Stream): number {
  if (column.kind === 'continuous') return column.low + stream.uniform() * (column.high - column.low);
  if (column.kind === 'integer') return column.low + stream.below(countValues(column));
  return stream.below(column.levels.length);
}

/** `rows` designs drawn independently and uniformly from the space. */
export function sampleUniform(space: Space, rows: number, stream: Stream): Designs {
  const designs = zeros(rows, space.columns.length);
  for (let i = 0; i < rows; i++) {
    const row = rowView(designs, i);
    space.columns.forEach((column, j) => {
      row[j] = sampleColumn(column, stream);
    });
  }
  return designs;
}

/** The first value that does not belong to the space, or `undefined` when all designs lie inside it. */
export function findBreach(space: Space, designs: Designs): Breach | undefined {
  for (let row = 0; row < designs.rows; row++) {
    const values = rowView(designs, row);
    for (let j = 0; j < space.columns.length; j++) {
      const column = space.columns[j]!;
      const problem = problemOf(column, values[j]!);
      if (problem !== undefined) return { row, column: column.name, value: values[j]!, problem };
    }
  }
  return undefined;
}

function problemOf(column: Column, value: number): string | undefined {
  if (!Number.isFinite(value)) return 'is not a finite number';
  if (column.kind === 'category') {
    const known = Number.isInteger(value) && value >= 0 && value < column.levels.length;
    return known ? undefined : `is not the index of one of ${column.levels.length} levels`;
  }
  if (column.kind === 'integer' && !Number.isInteger(value)) return 'is not a whole number';
  if (value < column.low || value > column.high) return `lies outside ${column.low} to ${column.high}`;
  return undefined;
}

function checkColumn(column: Column): void {
  const { name } = column;
  if (column.kind === 'category') {
    if (column.levels.length < 2) throw new RangeError(`column "${name}" needs at least two levels`);
    if (new Set(column.levels).size < column.levels.length)
      throw new RangeError(`column "${name}" repeats a level`);
    return;
  }
  if (!(Number.isFinite(column.low) && Number.isFinite(column.high) && column.low < column.high)) {
    throw new RangeError(
      `column "${name}" needs finite bounds with low < high, got ${column.low} and ${column.high}`,
    );
  }
  if (column.kind === 'integer' && !(Number.isInteger(column.low) && Number.isInteger(column.high))) {
    throw new RangeError(`column "${name}" needs whole-number bounds, got ${column.low} and ${column.high}`);
  }
}
