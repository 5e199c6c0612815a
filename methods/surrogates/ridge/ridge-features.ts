import { type Matrix, rowView, zeros } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import { OnebatchError } from '../../../harness/errors.js';

/** Which terms a ridge regression has. */
export interface RidgeTerms {
  /** 1: continuous and integer columns enter linearly; 2: also squared. */
  readonly degree: 1 | 2;
  /** Whether products between the first-degree terms of two different columns enter as well. */
  readonly pairwise: boolean;
}

/**
 * The terms of a ridge regression on encoded rows: first one of degree one for each encoded feature, then one of degree
 * two for each scaled column, then the products between columns.
 *
 * A scaled column u in [0, 1] enters as the Legendre polynomials √3 (2u − 1) and √5 (6u² − 6u + 1), a category by its
 * one-hot features: a weight of 1 then stands for about the same effect everywhere, so that one penalty fits all.
 */
export interface RidgeFeatures {
  readonly encoding: Encoding;
  readonly terms: RidgeTerms;
  readonly count: number;
  /** Where the square of each column stands; −1 for a category or at degree 1, (d). */
  readonly squareAt: Int32Array;
  /** Where the products of column i and column j > i start, with those of one feature of i together; `pairwise` only. */
  pairsAt(i: number, j: number): number;
  /** (n, width) to (n, count). */
  evaluate(x: Matrix): Matrix;
  /** Gradient at one encoded row, (width), of the terms' sum with the given coefficients, (count). */
  gradient(row: Float64Array, coefficients: Float64Array): Float64Array;
}

const mostProducts = 5000;
const root3 = Math.sqrt(3);
const root5 = Math.sqrt(5);

/** √3 (2u − 1), of variance 1 for u uniform on [0, 1]. */
export function linearTerm(u: number): number {
  return root3 * (2 * u - 1);
}

/** √5 (6u² − 6u + 1), of variance 1 for u uniform on [0, 1] and uncorrelated with `linearTerm`. */
export function squareTerm(u: number): number {
  return root5 * (6 * u * u - 6 * u + 1);
}

/**
 * Lays out the terms for an encoding.
 *
 * @throws OnebatchError (`method-cannot`) when `pairwise` asks for more than 5,000 products.
 */
export function makeRidgeFeatures(encoding: Encoding, terms: RidgeTerms): RidgeFeatures {
  const { blocks, width } = encoding;
  const scaled = blocks.map(({ column }) => column.kind !== 'category');
  let count = width;
  const squareAt = Int32Array.from(scaled, (isScaled) => (isScaled && terms.degree === 2 ? count++ : -1));
  const pairStart = count;
  const pairs = terms.pairwise ? layOutPairs(encoding, pairStart) : undefined;
  count = pairs?.end ?? count;
  const first = new Float64Array(width);

  return {
    encoding,
    terms,
    count,
    squareAt,
    pairsAt: (i, j) => pairs!.at[i]![j]!,
    evaluate(x) {
      const evaluated = zeros(x.rows, count);
      for (let r = 0; r < x.rows; r++) {
        const row = rowView(x, r);
        const into = rowView(evaluated, r);
        blocks.forEach(({ offset, width: span }, j) => {
          for (let f = offset; f < offset + span; f++) into[f] = scaled[j] ? linearTerm(row[f]!) : row[f]!;
          if (squareAt[j]! >= 0) into[squareAt[j]!] = squareTerm(row[offset]!);
        });
        if (pairs !== undefined) fillProducts(into);
      }
      return evaluated;
    },
    gradient(row, coefficients) {
      const gradient = coefficients.slice(0, width);
      blocks.forEach(({ offset, width: span }, j) => {
        for (let f = offset; f < offset + span; f++) first[f] = scaled[j] ? linearTerm(row[f]!) : row[f]!;
      });
      if (pairs !== undefined) addProductGradient(coefficients, gradient);
      blocks.forEach(({ offset }, j) => {
        if (!scaled[j]) return;
        gradient[offset]! *= 2 * root3;
        const square = squareAt[j]!;
        if (square >= 0) gradient[offset]! += coefficients[square]! * root5 * (12 * row[offset]! - 6);
      });
      return gradient;
    },
  };

  function fillProducts(into: Float64Array): void {
    let at = pairStart;
    forEachPair(encoding, (f, g) => {
      into[at++] = into[f]! * into[g]!;
    });
  }

  function addProductGradient(coefficients: Float64Array, gradient: Float64Array): void {
    let at = pairStart;
    forEachPair(encoding, (f, g) => {
      const c = coefficients[at++]!;
      gradient[f]! += c * first[g]!;
      gradient[g]! += c * first[f]!;
    });
  }
}

function layOutPairs({ blocks }: Encoding, start: number): { end: number; at: number[][] } {
  let end = start;
  const at = blocks.map((a, i) =>
    blocks.map((b, j) => {
      if (j <= i) return -1;
      const here = end;
      end += a.width * b.width;
      return here;
    }),
  );
  if (end - start > mostProducts) {
    throw new OnebatchError(
      'method-cannot',
      `pairwise needs ${end - start} products between columns, at most ${mostProducts} are possible; leave pairwise off or use fewer columns or levels`,
    );
  }
  return { end, at };
}

/** Visits the features (f, g) of all pairs of columns in the order in which their products are laid out. */
function forEachPair({ blocks }: Encoding, visit: (f: number, g: number) => void): void {
  for (let i = 0; i < blocks.length; i++) {
    const a = blocks[i]!;
    for (let j = i + 1; j < blocks.length; j++) {
      const b = blocks[j]!;
      for (let f = a.offset; f < a.offset + a.width; f++) {
        for (let g = b.offset; g < b.offset + b.width; g++) visit(f, g);
      }
    }
  }
}
