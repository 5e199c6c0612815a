/** Constants of Adam; decay rates as recommended by its authors. */
export interface AdamSettings {
  readonly learningRate: number;
  /** Decoupled weight decay (Loshchilov & Hutter 2019); 0 for plain Adam. */
  readonly weightDecay: number;
}

const meanDecay = 0.9;
const squareDecay = 0.999;
const epsilon = 1e-8;

/**
 * Adam (Kingma & Ba 2015, algorithm 1) with decoupled weight decay (Loshchilov & Hutter 2019, algorithm 2), for a
 * fixed list of parameter arrays that it changes in place.
 */
export class Adam {
  readonly #targets: readonly Float32Array[];
  readonly #means: readonly Float32Array[];
  readonly #squares: readonly Float32Array[];
  readonly #settings: AdamSettings;
  #step = 0;

  constructor(targets: readonly Float32Array[], settings: AdamSettings) {
    this.#targets = targets;
    this.#means = targets.map((target) => new Float32Array(target.length));
    this.#squares = targets.map((target) => new Float32Array(target.length));
    this.#settings = settings;
  }

  /** One step against the gradients, one array for each target in the same order. */
  step(gradients: readonly Float32Array[]): void {
    this.#step += 1;
    const { learningRate, weightDecay } = this.#settings;
    const rate = learningRate / (1 - meanDecay ** this.#step);
    const squareScale = 1 / (1 - squareDecay ** this.#step);
    const shrink = 1 - learningRate * weightDecay;
    this.#targets.forEach((target, t) => {
      const gradient = gradients[t]!;
      const means = this.#means[t]!;
      const squares = this.#squares[t]!;
      for (let i = 0; i < target.length; i++) {
        const g = gradient[i]!;
        const mean = meanDecay * means[i]! + (1 - meanDecay) * g;
        const square = squareDecay * squares[i]! + (1 - squareDecay) * g * g;
        means[i] = mean;
        squares[i] = square;
        target[i] = shrink * target[i]! - (rate * mean) / (Math.sqrt(square * squareScale) + epsilon);
      }
    });
  }
}
