import { type Designs, type Matrix, rowView, zeros } from './designs.js';
import type { Column, Space } from './space.js';

/** Where a column of the space lies in the encoded row: `width` features from `offset` on. */
export interface Block {
  readonly column: Column;
  readonly offset: number;
  readonly width: number;
}

/**
 * How designs become numbers for a model: a continuous or integer column is scaled to [0, 1], a category column
 * becomes one feature a level, 1 at its level and 0 elsewhere (one-hot).
 */
export interface Encoding {
  readonly space: Space;
  /** One block a column, in the space's order. */
  readonly blocks: readonly Block[];
  /** Features in an encoded row. */
  readonly width: number;
}

/** The encoding of a space. */
export function makeEncoding(space: Space): Encoding {
  let offset = 0;
  const blocks = space.columns.map((column) => {
    const width = column.kind === 'category' ? column.levels.length : 1;
    const block = { column, offset, width };
    offset += width;
    return block;
  });
  return { space, blocks, width: offset };
}

/** Encodes designs, (n, d) to (n, width). A value that is not a number makes all features of its column NaN. */
export function encode(encoding: Encoding, designs: Designs): Matrix {
  const encoded = zeros(designs.rows, encoding.width);
  for (let i = 0; i < designs.rows; i++) {
    const from = rowView(designs, i);
    const to = rowView(encoded, i);
    encoding.blocks.forEach(({ column, offset, width }, j) => {
      if (column.kind === 'category') {
        if (Number.isNaN(from[j]!)) to.fill(Number.NaN, offset, offset + width);
        else to[offset + from[j]!] = 1;
      } else to[offset] = (from[j]! - column.low) / (column.high - column.low);
    });
  }
  return encoded;
}

/**
 * The designs nearest to encoded rows, (n, width) to (n, d): scaled columns are cut to [0, 1] and whole numbers
 * rounded; a category takes the level with the largest feature (the first of equals). A feature that is not a number
 * makes the value of its column NaN. `decode(encode(x))` is x, to the rounding of one multiplication for continuous
 * columns.
 */
export function decode(encoding: Encoding, encoded: Matrix): Designs {
  const designs = zeros(encoded.rows, encoding.blocks.length);
  for (let i = 0; i < encoded.rows; i++) {
    const from = rowView(encoded, i);
    const to = rowView(designs, i);
    encoding.blocks.forEach((block, j) => {
      to[j] = decodeBlock(block, from);
    });
  }
  return designs;
}

/** Encoded rows moved to the nearest row that stands for a design: `encode(decode(x))`. */
export function snap(encoding: Encoding, encoded: Matrix): Matrix {
  return encode(encoding, decode(encoding, encoded));
}

/**
 * Moves encoded rows, in place, to the nearest point of the relaxed space: scaled columns into [0, 1], the features
 * of a category onto the probability simplex (Michelot 1986).
 */
export function projectInPlace(encoding: Encoding, encoded: Matrix): void {
  for (let i = 0; i < encoded.rows; i++) {
    const row = rowView(encoded, i);
    for (const { column, offset, width } of encoding.blocks) {
      if (column.kind === 'category') projectOntoSimplex(row.subarray(offset, offset + width));
      else row[offset] = Math.min(1, Math.max(0, row[offset]!));
    }
  }
}

function decodeBlock({ column, offset, width }: Block, encodedRow: Float64Array): number {
  if (column.kind === 'category') {
    let best = 0;
    for (let level = 0; level < width; level++) {
      const feature = encodedRow[offset + level]!;
      if (Number.isNaN(feature)) return Number.NaN;
      if (feature > encodedRow[offset + best]!) best = level;
    }
    return best;
  }
  const share = Math.min(1, Math.max(0, encodedRow[offset]!));
  const value = column.low + share * (column.high - column.low);
  if (column.kind === 'integer') return Math.round(value) + 0; // −0 becomes 0
  return Math.min(column.high, Math.max(column.low, value));
}

function projectOntoSimplex(point: Float64Array): void {
  // Taking the largest feature off all of them leaves the projection as it is, and huge features exact.
  let largest = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < point.length; k++) largest = Math.max(largest, point[k]!);
  for (let k = 0; k < point.length; k++) point[k] = point[k]! - largest;
  let threshold = Number.NEGATIVE_INFINITY;
  let active = Number.POSITIVE_INFINITY;
  for (;;) {
    let sum = 0;
    let above = 0;
    for (let k = 0; k < point.length; k++) {
      if (point[k]! > threshold) {
        sum += point[k]!;
        above += 1;
      }
    }
    if (above >= active || above === 0) break; // exactly equal, but for rounding
    active = above;
    threshold = (sum - 1) / above;
  }
  for (let k = 0; k < point.length; k++) point[k] = Math.max(0, point[k]! - threshold);
}
