/**
 * Products of rows with one matrix, Σ over features of row[feature] · matrix[feature, k], cheap where consecutive rows
 * have few different features, as when single columns of a design are changed in turn: then only the differences to
 * the last row that was multiplied in full are added to its product. A result can differ from the full product by
 * rounding, never by more, since differences are not added up over several rows.
 */
export class RowProduct {
  readonly #matrix: Float64Array;
  readonly #stride: number;
  readonly #base: Float64Array;
  readonly #baseProduct: Float64Array;
  readonly #different: Int32Array;
  /** How many entries of the base product are in use; −1 before there is one. */
  #baseCount = -1;

  /** @param matrix feature by feature, (features, stride); not copied */
  constructor(matrix: Float64Array, features: number, stride: number) {
    this.#matrix = matrix;
    this.#stride = stride;
    this.#base = new Float64Array(features);
    this.#baseProduct = new Float64Array(stride);
    this.#different = new Int32Array(features);
  }

  /** Has to be called when the matrix was changed. */
  forget(): void {
    this.#baseCount = -1;
  }

  /** Writes the first `count` entries of row · matrix to `into`. */
  multiply(row: Float64Array, count: number, into: Float64Array): void {
    const base = this.#base;
    let different = 0;
    let present = 0;
    for (let f = 0; f < base.length; f++) {
      if (row[f] !== base[f]) this.#different[different++] = f;
      if (row[f] !== 0) present++;
    }
    if (count !== this.#baseCount || different >= present) {
      this.#baseProduct.fill(0);
      for (let f = 0; f < base.length; f++) {
        base[f] = row[f]!;
        if (row[f] !== 0) this.#add(f, row[f]!, count, this.#baseProduct);
      }
      this.#baseCount = count;
      different = 0;
    }
    for (let k = 0; k < count; k++) into[k] = this.#baseProduct[k]!;
    for (let d = 0; d < different; d++) {
      const f = this.#different[d]!;
      this.#add(f, row[f]! - base[f]!, count, into);
    }
  }

  #add(feature: number, factor: number, count: number, into: Float64Array): void {
    const matrix = this.#matrix;
    for (let k = 0, at = feature * this.#stride; k < count; k++, at++) into[k]! += factor * matrix[at]!;
  }
}
