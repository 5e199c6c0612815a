import { type Designs, rowKey, rowView, takeRows, zeros } from '../../harness/designs.js';

interface Entry {
  readonly design: Float64Array;
  readonly value: number;
  readonly arrival: number;
}

/**
 * Keeps the best distinct designs seen, at most `capacity` ≥ 1; equal values keep their order of arrival. A design
 * must have the same value whenever it is added.
 */
export class Archive {
  readonly #capacity: number;
  readonly #columns: number;
  #entries = new Map<string, Entry>();
  #arrivals = 0;
  /** A value at or below it can't enter: the worst of `capacity` designs that are kept. */
  #floor = Number.NEGATIVE_INFINITY;

  /** `columns`: numbers a design. */
  constructor(capacity: number, columns: number) {
    this.#capacity = capacity;
    this.#columns = columns;
  }

  /** Adds designs, (n, d), with their values, (n), without NaN; larger is better. Copies what it keeps. */
  add(designs: Designs, values: Float64Array): void {
    for (let i = 0; i < designs.rows; i++) {
      const value = values[i]!;
      const arrival = this.#arrivals++;
      if (value <= this.#floor) continue;
      const key = rowKey(designs, i);
      if (!this.#entries.has(key)) {
        this.#entries.set(key, { design: rowView(designs, i).slice(), value, arrival });
      }
      if (this.#entries.size >= 2 * this.#capacity) this.#prune();
    }
  }

  /** The best distinct designs, best first: at most `capacity`, fewer when fewer were seen. */
  best(): { designs: Designs; values: Float64Array } {
    const kept = this.#ranked().slice(0, this.#capacity);
    const designs = zeros(kept.length, this.#columns);
    kept.forEach(([, { design }], i) => {
      designs.values.set(design, i * this.#columns);
    });
    return { designs, values: Float64Array.from(kept, ([, { value }]) => value) };
  }

  /** Exactly `capacity` designs: the best distinct ones, gone through again from the best when fewer were seen. */
  batch(): Designs {
    const { designs } = this.best();
    return takeRows(
      designs,
      Array.from({ length: this.#capacity }, (_, i) => i % designs.rows),
    );
  }

  #ranked(): [string, Entry][] {
    return [...this.#entries].sort(([, a], [, b]) => b.value - a.value || a.arrival - b.arrival);
  }

  #prune(): void {
    const kept = this.#ranked().slice(0, this.#capacity);
    this.#entries = new Map(kept);
    this.#floor = kept[kept.length - 1]![1].value;
  }
}
