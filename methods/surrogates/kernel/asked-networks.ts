import type { Matrix } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import type { OutputScaling } from '../network/trained-network.js';
import { heldKernel, holdKernel, type Kernel, takeKernel } from './kernel.js';
import type { KernelParameters } from './kernel-parameters.js';
import { placeShape, useEncoding, useNetworks } from './network-shape.js';

/** Networks of one shape that the kernel is asked about together; they share the scaling of their scores. */
export class AskedNetworks {
  readonly #encoding: Encoding;
  readonly #networks: readonly KernelParameters[];
  readonly #scaling: OutputScaling;
  #mark = 0;
  #transposed = false;

  constructor(encoding: Encoding, networks: readonly KernelParameters[], scaling: OutputScaling) {
    this.#encoding = encoding;
    this.#networks = networks;
    this.#scaling = scaling;
  }

  /** Each network's scores of encoded rows, (n, width) to (n) each. */
  scores(x: Matrix): Float64Array[] {
    const { call, arena } = this.#prepare();
    const outputs = arena.reserve(4 * this.#networks.length * x.rows);
    call.predict(arena.place(x.values), x.rows, outputs);
    return this.#scoresAt(arena.floats(outputs, this.#networks.length * x.rows), x.rows);
  }

  /** The same, and the gradient of mean − spreadWeight · spread by the encoded rows, in score units. */
  gradient(x: Matrix, spreadWeight: number): { scores: Float64Array[]; gradient: Matrix } {
    const { call, arena } = this.#prepare();
    if (!this.#transposed) call.transposeMembers(1);
    this.#transposed = true;
    const outputs = arena.reserve(4 * this.#networks.length * x.rows);
    const gradient = arena.reserve(8 * x.values.length);
    const { deviation } = this.#scaling;
    call.gradients(arena.place(x.values), x.rows, outputs, gradient, spreadWeight, deviation);
    return {
      scores: this.#scoresAt(arena.floats(outputs, this.#networks.length * x.rows), x.rows),
      gradient: { rows: x.rows, columns: x.columns, values: arena.doubles(gradient, x.values.length) },
    };
  }

  /** The kernel with these networks in it, put there anew only where others have used it meanwhile. */
  #prepare(): Kernel {
    const held = heldKernel(this);
    if (held !== undefined) {
      held.arena.rewind(this.#mark);
      return held;
    }
    const kernel = takeKernel();
    this.#place(kernel);
    this.#mark = kernel.arena.mark;
    this.#transposed = false;
    holdKernel(this);
    return kernel;
  }

  #place(kernel: Kernel): void {
    useEncoding(kernel, this.#encoding);
    const { shape: widths, panels } = this.#networks[0]!;
    const shape = placeShape(kernel, widths);
    const parameters = kernel.arena.reserve(panels.byteLength * this.#networks.length);
    this.#networks.forEach((network, m) => {
      kernel.arena.write(parameters + m * panels.byteLength, network.panels);
    });
    useNetworks(kernel, shape, parameters, { members: this.#networks.length });
  }

  #scoresAt(outputs: Float32Array, rows: number): Float64Array[] {
    const { mean, deviation } = this.#scaling;
    return this.#networks.map((_, m) => {
      const scores = new Float64Array(rows);
      for (let i = 0; i < rows; i++) scores[i] = mean + deviation * outputs[m * rows + i]!;
      return scores;
    });
  }
}
