import { OnebatchError } from '../../../harness/errors.js';

const pageBytes = 65_536;

/** Places start at multiples of a cache line. */
const alignment = 64;

/** The kernel's memory, handed out from its start on and taken back all at once. */
export class Arena {
  readonly #memory: WebAssembly.Memory;
  readonly #first: number;
  #next: number;

  constructor(memory: WebAssembly.Memory, first: number) {
    this.#memory = memory;
    this.#first = first;
    this.#next = first;
  }

  /** Takes back everything. */
  reset(): void {
    this.#next = this.#first;
  }

  /** How far memory is handed out, for `rewind`. */
  get mark(): number {
    return this.#next;
  }

  /** Takes back what was handed out since the mark. */
  rewind(mark: number): void {
    this.#next = mark;
  }

  /**
   * The address of `bytes` free bytes, holding anything.
   *
   * @throws OnebatchError (`method-cannot`) when the kernel's memory can't grow that far.
   */
  reserve(bytes: number): number {
    const start = Math.ceil(this.#next / alignment) * alignment;
    const missing = start + bytes - this.#memory.buffer.byteLength;
    if (missing > 0) this.#grow(Math.ceil(missing / pageBytes), start + bytes);
    this.#next = start + bytes;
    return start;
  }

  /** Copies numbers in and returns their address. */
  place(values: Float64Array | Float32Array | Int32Array): number {
    const at = this.reserve(values.byteLength);
    this.write(at, values);
    return at;
  }

  /** Copies numbers to a place that was reserved for them. */
  write(at: number, { buffer, byteOffset, byteLength }: Float64Array | Float32Array | Int32Array): void {
    new Uint8Array(this.#memory.buffer).set(new Uint8Array(buffer, byteOffset, byteLength), at);
  }

  /** A copy of `count` 32-bit floats. */
  floats(at: number, count: number): Float32Array<ArrayBuffer> {
    return new Float32Array(this.#memory.buffer.slice(at, at + 4 * count));
  }

  /** A copy of `count` 64-bit floats. */
  doubles(at: number, count: number): Float64Array<ArrayBuffer> {
    return new Float64Array(this.#memory.buffer.slice(at, at + 8 * count));
  }

  /** A view for writing whole numbers; good until the next `reserve` or `place`. */
  integers(at: number, count: number): Int32Array {
    return new Int32Array(this.#memory.buffer, at, count);
  }

  #grow(pages: number, bytes: number): void {
    try {
      this.#memory.grow(pages);
    } catch (cause) {
      throw new OnebatchError(
        'method-cannot',
        `the network needs ${Math.ceil(bytes / 1e6)} MB at once, more than there is; use a smaller width or batch`,
        { cause },
      );
    }
  }
}
