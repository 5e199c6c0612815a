import type { Stream } from '../../harness/random.js';
import { type FactorSum, strideOf } from './factor-sum.js';

/** What asking for a gain costs besides its look-ups, in look-ups. */
const overhead = 4;

/** A sequence under change, with its sum of factors kept up to date. */
export class FactorState {
  readonly letters: Uint8Array;
  /** Sites that share a factor with each site. */
  readonly neighbours: readonly (readonly number[])[];
  /** The sum of factors at the present letters. */
  value = 0;
  /** What was spent so far: table look-ups, and `overhead` more for every gain asked for. */
  work = 0;
  readonly #sum: FactorSum;
  /** Where each factor's table stands at the present letters. */
  readonly #index: Int32Array;
  /** The factors that hold each site, and how far their index moves with its letter. */
  readonly #factors: readonly Int32Array[];
  readonly #strides: readonly Int32Array[];

  constructor(sum: FactorSum) {
    this.#sum = sum;
    this.letters = new Uint8Array(sum.sites);
    this.#index = new Int32Array(sum.factors.length);
    const held = Array.from({ length: sum.sites }, () => [] as number[]);
    const neighbours = Array.from({ length: sum.sites }, () => new Set<number>());
    sum.factors.forEach(({ sites }, factor) => {
      for (const site of sites) {
        held[site]!.push(factor);
        for (const other of sites) if (other !== site) neighbours[site]!.add(other);
      }
    });
    this.neighbours = neighbours.map((set) => [...set]);
    this.#factors = held.map((factors) => Int32Array.from(factors));
    this.#strides = held.map((factors, site) =>
      Int32Array.from(factors, (factor) => strideOf(sum.factors[factor]!.sites, site, sum.alphabet)),
    );
    this.value = this.#addUp();
  }

  /** Draws every letter anew. */
  randomize(stream: Stream): void {
    for (let site = 0; site < this.letters.length; site++)
      this.letters[site] = stream.below(this.#sum.alphabet);
    this.value = this.#addUp();
  }

  /** How much the sum would rise if `site` took `letter`. */
  gain(site: number, letter: number): number {
    const move = letter - this.letters[site]!;
    const factors = this.#factors[site]!;
    const strides = this.#strides[site]!;
    let gain = 0;
    for (let k = 0; k < factors.length; k++) {
      const { table } = this.#sum.factors[factors[k]!]!;
      const at = this.#index[factors[k]!]!;
      gain += table[at + move * strides[k]!]! - table[at]!;
    }
    this.work += factors.length + overhead;
    return gain;
  }

  /** Gives `site` the letter `letter`, whose gain is known. */
  change(site: number, letter: number, gain: number): void {
    const move = letter - this.letters[site]!;
    const factors = this.#factors[site]!;
    const strides = this.#strides[site]!;
    for (let k = 0; k < factors.length; k++) this.#index[factors[k]!]! += move * strides[k]!;
    this.letters[site] = letter;
    this.value += gain;
  }

  #addUp(): number {
    return this.#sum.factors.reduce((total, { sites, table }, factor) => {
      const at = sites.reduce((index, site) => index * this.#sum.alphabet + this.letters[site]!, 0);
      this.#index[factor] = at;
      this.work++;
      return total + table[at]!;
    }, 0);
  }
}
