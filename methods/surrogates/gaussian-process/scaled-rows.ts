import type { Matrix } from '../../../harness/designs.js';
import type { KernelLayout } from './kernel-layout.js';
import { RowProduct } from './row-product.js';

/**
 * Encoded rows kept ready for distances under given length scales:
 * r² = Σ over features of ((a − b) / length scale)².
 *
 * A one-hot block costs as many operations as the asking row has non-zero features there, not as it has levels,
 * and a row that differs little from the one asked before costs less (see `RowProduct`).
 */
export class ScaledRows {
  readonly layout: KernelLayout;
  /** 1 / length scale², a feature, (width). */
  readonly #weights: Float64Array;
  /** The rows as given, (capacity, width). */
  readonly #raw: Float64Array;
  /** Their continuous and integer features over the length scale, (capacity, layout.scaled.length). */
  readonly #scaled: Float64Array;
  /** The category features times −2 · weight, feature by feature, (layout.oneHot.length, capacity). */
  readonly #hot: Float64Array;
  /** Squared length of each row's category features, weighted, (capacity). */
  readonly #norms: Float64Array;
  readonly #asked: Float64Array;
  readonly #hotProduct: RowProduct;
  readonly #askedHot: Float64Array;
  readonly #products: Float64Array;
  readonly #capacity: number;
  #size = 0;

  /** Takes a copy of the rows and keeps room for `room` more. */
  constructor(layout: KernelLayout, lengthScales: Float64Array, x: Matrix, room = 0) {
    const capacity = x.rows + room;
    this.layout = layout;
    this.#weights = Float64Array.from(layout.groupOf, (group) => lengthScales[group]! ** -2);
    this.#raw = new Float64Array(capacity * layout.width);
    this.#scaled = new Float64Array(capacity * layout.scaled.length);
    this.#norms = new Float64Array(capacity);
    this.#asked = new Float64Array(layout.scaled.length);
    this.#hot = new Float64Array(layout.oneHot.length * capacity);
    this.#hotProduct = new RowProduct(this.#hot, layout.oneHot.length, capacity);
    this.#askedHot = new Float64Array(layout.oneHot.length);
    this.#products = new Float64Array(capacity);
    this.#capacity = capacity;
    for (let i = 0; i < x.rows; i++) this.append(x.values.subarray(i * x.columns, (i + 1) * x.columns));
  }

  get size(): number {
    return this.#size;
  }

  /** Row `i` as given; a view. */
  row(i: number): Float64Array {
    return this.#raw.subarray(i * this.layout.width, (i + 1) * this.layout.width);
  }

  /** Adds a row; there must be room. */
  append(row: Float64Array): void {
    const i = this.#size;
    const { scaled, oneHot, width } = this.layout;
    this.#raw.set(row, i * width);
    for (let h = 0; h < oneHot.length; h++) {
      this.#hot[h * this.#capacity + i] = -2 * this.#weights[oneHot[h]!]! * row[oneHot[h]!]!;
    }
    this.#hotProduct.forget();
    this.#scale(row, this.#scaled, i * scaled.length);
    this.#norms[i] = this.#normOf(row);
    this.#size++;
  }

  /** Squared scaled distance of `row` to every kept row, written to `into`, (size). */
  squaredDistances(row: Float64Array, into: Float64Array): void {
    const { scaled, oneHot } = this.layout;
    const asked = this.#asked;
    const kept = this.#scaled;
    const across = scaled.length;
    const size = this.#size;
    this.#scale(row, asked, 0);
    for (let i = 0; i < size; i++) {
      let sum = 0;
      for (let f = 0, at = i * across; f < across; f++, at++) {
        const difference = kept[at]! - asked[f]!;
        sum += difference * difference;
      }
      into[i] = sum;
    }
    if (oneHot.length === 0) return;
    for (let h = 0; h < oneHot.length; h++) this.#askedHot[h] = row[oneHot[h]!]!;
    this.#hotProduct.multiply(this.#askedHot, size, this.#products);
    const norm = this.#normOf(row);
    for (let i = 0; i < size; i++) {
      into[i] = Math.max(0, into[i]! + norm + this.#norms[i]! + this.#products[i]!);
    }
  }

  /**
   * Adds to `into`, (width), the gradient at `row` of Σ over kept rows of coefficient · r², where `coefficients` holds
   * one number a kept row.
   */
  addDistanceGradient(row: Float64Array, coefficients: Float64Array, into: Float64Array): void {
    const { width } = this.layout;
    const pulled = new Float64Array(width);
    let total = 0;
    for (let i = 0; i < this.#size; i++) {
      const c = coefficients[i]!;
      total += c;
      for (let f = 0, at = i * width; f < width; f++, at++) pulled[f]! += c * this.#raw[at]!;
    }
    for (let f = 0; f < width; f++) into[f]! += 2 * this.#weights[f]! * (total * row[f]! - pulled[f]!);
  }

  #scale(row: Float64Array, into: Float64Array, at: number): void {
    const { scaled } = this.layout;
    for (let k = 0; k < scaled.length; k++)
      into[at + k] = row[scaled[k]!]! * Math.sqrt(this.#weights[scaled[k]!]!);
  }

  #normOf(row: Float64Array): number {
    let norm = 0;
    for (const f of this.layout.oneHot) norm += this.#weights[f]! * row[f]! * row[f]!;
    return norm;
  }
}
