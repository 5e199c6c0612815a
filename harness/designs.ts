/** A row-major table of numbers, `rows` × `columns`; row i starts at `i * columns`. */
export interface Matrix {
  readonly rows: number;
  readonly columns: number;
  readonly values: Float64Array;
}

/**
 * Designs of a space, one a row, one number a column of the space: a continuous or integer column holds its value
 * in the column's own unit, a category column the index of its level.
 */
export type Designs = Matrix;

/** A matrix of zeros. */
export function zeros(rows: number, columns: number): Matrix {
  return { rows, columns, values: new Float64Array(rows * columns) };
}

/** A matrix holding a copy of the given rows. Throws RangeError when the rows differ in length. */
export function matrixFromRows(rows: readonly ArrayLike<number>[], columns = rows[0]?.length ?? 0): Matrix {
  const matrix = zeros(rows.length, columns);
  rows.forEach((row, i) => {
    if (row.length !== columns)
      throw new RangeError(`row ${i} has ${row.length} values, expected ${columns}`);
    matrix.values.set(Array.from(row), i * columns);
  });
  return matrix;
}

/** Row `i` as a view on the matrix: writing to it writes to the matrix. */
export function rowView(matrix: Matrix, i: number): Float64Array {
  return matrix.values.subarray(i * matrix.columns, (i + 1) * matrix.columns);
}

/**
 * A copy of the named rows, in the order given; a row may be named more than once. Throws RangeError for a row that
 * the matrix doesn't have.
 */
export function takeRows(matrix: Matrix, indices: ArrayLike<number>): Matrix {
  const taken = zeros(indices.length, matrix.columns);
  for (let k = 0; k < indices.length; k++) {
    const i = indices[k]!;
    if (!(Number.isInteger(i) && i >= 0 && i < matrix.rows))
      throw new RangeError(`there is no row ${i} among ${matrix.rows}`);
    taken.values.set(rowView(matrix, i), k * matrix.columns);
  }
  return taken;
}

/** The rows of all parts, one part under another. Throws RangeError when their columns differ in number. */
export function stackRows(parts: readonly Matrix[]): Matrix {
  const columns = parts[0]?.columns ?? 0;
  const rows = parts.reduce((sum, part) => sum + part.rows, 0);
  const stacked = zeros(rows, columns);
  let at = 0;
  for (const part of parts) {
    if (part.columns !== columns)
      throw new RangeError(`cannot stack ${part.columns} columns under ${columns}`);
    stacked.values.set(part.values, at);
    at += part.values.length;
  }
  return stacked;
}

/** A matrix of its own with the same numbers. */
export function copyMatrix(matrix: Matrix): Matrix {
  return { rows: matrix.rows, columns: matrix.columns, values: matrix.values.slice() };
}

/** A text that is equal for two rows exactly when all their numbers are equal (−0 counts as 0). */
export function rowKey(matrix: Matrix, i: number): string {
  return rowView(matrix, i).join(',');
}

/** How many different rows there are. */
export function countDistinctRows(matrix: Matrix): number {
  const seen = new Set<string>();
  for (let i = 0; i < matrix.rows; i++) seen.add(rowKey(matrix, i));
  return seen.size;
}

/** Row numbers from the highest value to the lowest; equal values keep their order. NaN is not allowed. */
export function orderByDescending(values: ArrayLike<number>): number[] {
  return Array.from({ length: values.length }, (_, i) => i).sort((a, b) => values[b]! - values[a]! || a - b);
}
