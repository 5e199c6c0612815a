import { type Designs, rowView } from '../../../harness/designs.js';
import type { Block } from '../../../harness/encoding.js';
import { countValues, type Space } from '../../../harness/space.js';
import { linearTerm, type RidgeFeatures, squareTerm } from './ridge-features.js';

/** Largest space whose designs are all gone through to maximize a regression with pairs. */
export const mostEnumerated = 200_000;

/** Whether `maximizeTerms` finds the maximum for certain. */
export function isExact({ encoding, terms }: Pick<RidgeFeatures, 'encoding' | 'terms'>): boolean {
  return !terms.pairwise || countDesigns(encoding.space) <= mostEnumerated;
}

/**
 * The design, (d), with the largest Σ weight · term. Without pairs each column is maximized on its own, exactly. With
 * pairs all designs are gone through where there are at most 200,000; in a larger space one column after another is
 * maximized exactly given the others, from the design that the single columns favour and from each of `starts`, until
 * nothing changes: a local maximum, the best one found.
 */
export function maximizeTerms(features: RidgeFeatures, weights: Float64Array, starts: Designs): Float64Array {
  const alone = Float64Array.from(features.encoding.blocks, (_, j) =>
    maximizeColumn(features, weights, j, weights),
  );
  if (!features.terms.pairwise) return alone;
  if (isExact(features)) return enumerate(features, weights);
  let best: { design: Float64Array; value: number } = { design: alone, value: Number.NEGATIVE_INFINITY };
  const tried = [alone, ...Array.from({ length: starts.rows }, (_, i) => rowView(starts, i).slice())];
  for (const start of tried) {
    const end = ascendColumns(features, weights, start);
    if (end.value > best.value) best = end;
  }
  return best.design;
}

/** How many designs a space holds; Infinity with a continuous column. */
export function countDesigns(space: Space): number {
  return space.columns.reduce((product, column) => product * countValues(column), 1);
}

/**
 * The value of column `j` that is best by its own terms, where `linear`, (width or longer), holds the weights of the
 * first-degree terms; of equals the first. The vertex of the parabola counts, or the whole numbers beside it.
 */
function maximizeColumn(
  { encoding, squareAt }: RidgeFeatures,
  weights: Float64Array,
  j: number,
  linear: Float64Array,
): number {
  const block = encoding.blocks[j]!;
  const square = squareAt[j]! < 0 ? 0 : weights[squareAt[j]!]!;
  let best = 0;
  let most = Number.NEGATIVE_INFINITY;
  for (const value of contenders(block, linear, square)) {
    const worth = columnWorth(block, linear, square, value);
    if (worth > most) {
      most = worth;
      best = value;
    }
  }
  return best;
}

function contenders({ column, offset }: Block, linear: Float64Array, square: number): number[] {
  if (column.kind === 'category') return column.levels.map((_, level) => level);
  const { low, high } = column;
  const range = high - low;
  const bend = Math.sqrt(5) * 6 * square;
  if (!(bend < 0)) return [low, high];
  const vertex = low + range * (0.5 - (Math.sqrt(3) * linear[offset]!) / bend);
  const inside = Math.min(high, Math.max(low, vertex));
  return column.kind === 'continuous'
    ? [low, high, inside]
    : [low, high, Math.floor(inside), Math.ceil(inside)];
}

function columnWorth({ column, offset }: Block, linear: Float64Array, square: number, value: number): number {
  if (column.kind === 'category') return linear[offset + value]!;
  const u = (value - column.low) / (column.high - column.low);
  return linear[offset]! * linearTerm(u) + square * squareTerm(u);
}

/** Adds to `linear` what the products of column `j` with column `k` at `value` are worth to column j's features. */
function addPair(
  { encoding, pairsAt }: RidgeFeatures,
  weights: Float64Array,
  j: number,
  k: number,
  value: number,
  linear: Float64Array,
): void {
  const own = encoding.blocks[j]!;
  const other = encoding.blocks[k]!;
  const isCategory = other.column.kind === 'category';
  const term =
    other.column.kind === 'category'
      ? 1
      : linearTerm((value - other.column.low) / (other.column.high - other.column.low));
  const g = isCategory ? value : 0;
  for (let f = 0; f < own.width; f++) {
    const at = k < j ? pairsAt(k, j) + g * own.width + f : pairsAt(j, k) + f * other.width + g;
    linear[own.offset + f]! += weights[at]! * term;
  }
}

function resetLinear({ offset, width }: Block, weights: Float64Array, linear: Float64Array): void {
  for (let f = offset; f < offset + width; f++) linear[f] = weights[f]!;
}

function ascendColumns(
  features: RidgeFeatures,
  weights: Float64Array,
  start: Float64Array,
): { design: Float64Array; value: number } {
  const { blocks, width } = features.encoding;
  const design = start;
  const linear = new Float64Array(width);
  const square = (j: number) => (features.squareAt[j]! < 0 ? 0 : weights[features.squareAt[j]!]!);
  const gather = (j: number, below: number) => {
    resetLinear(blocks[j]!, weights, linear);
    for (let k = 0; k < below; k++) if (k !== j) addPair(features, weights, j, k, design[k]!, linear);
  };
  for (let sweep = 0, changed = true; changed && sweep < 100; sweep++) {
    changed = false;
    for (let j = 0; j < blocks.length; j++) {
      gather(j, blocks.length);
      const value = maximizeColumn(features, weights, j, linear);
      const gain =
        columnWorth(blocks[j]!, linear, square(j), value) -
        columnWorth(blocks[j]!, linear, square(j), design[j]!);
      if (gain > 1e-12) {
        design[j] = value;
        changed = true;
      }
    }
  }
  let value = 0;
  for (let j = 0; j < blocks.length; j++) {
    gather(j, j);
    value += columnWorth(blocks[j]!, linear, square(j), design[j]!);
  }
  return { design, value };
}

/** Goes through all designs, column by column, carrying the sum of the columns already set. */
function enumerate(features: RidgeFeatures, weights: Float64Array): Float64Array {
  const { blocks, width } = features.encoding;
  const linear = new Float64Array(width);
  const design = new Float64Array(blocks.length);
  let best = design.slice();
  let most = Number.NEGATIVE_INFINITY;
  const visit = (j: number, sum: number): void => {
    if (j === blocks.length) {
      if (sum > most) {
        most = sum;
        best = design.slice();
      }
      return;
    }
    const block = blocks[j]!;
    resetLinear(block, weights, linear);
    for (let k = 0; k < j; k++) addPair(features, weights, j, k, design[k]!, linear);
    const square = features.squareAt[j]! < 0 ? 0 : weights[features.squareAt[j]!]!;
    const low = block.column.kind === 'category' ? 0 : block.column.low;
    const count = countValues(block.column);
    for (let v = 0; v < count; v++) {
      design[j] = low + v;
      visit(j + 1, sum + columnWorth(block, linear, square, low + v));
    }
  };
  visit(0, 0);
  return best;
}
