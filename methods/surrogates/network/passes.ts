import * as tf from '@tensorflow/tfjs-core';
import { leak } from './leak.js';
import type { Parameters } from './parameters.js';

/** A network's parameters as tensors; `dispose` frees them. */
export class DeviceNetwork {
  readonly #weights: readonly tf.Tensor2D[];
  readonly #biases: readonly tf.Tensor1D[];
  /** The wasm backend multiplies far faster with explicitly transposed operands than with transpose flags. */
  readonly #transposed: (tf.Tensor2D | undefined)[] = [];
  readonly #slope: number;

  /** @param slope slope of the hidden units below zero; 0 makes them plain rectified units. */
  constructor(parameters: Parameters, slope = leak) {
    this.#slope = slope;
    this.#weights = parameters.map((layer) => tf.tensor2d(layer.weights, [layer.inputs, layer.outputs]));
    this.#biases = parameters.map((layer) => tf.tensor1d(layer.biases));
  }

  dispose(): void {
    for (const tensor of [...this.#weights, ...this.#biases, ...this.#transposed]) tensor?.dispose();
  }

  /** Outputs for n rows of inputs, (n × inputs) row-major to (n). */
  outputs(rows: Float32Array, n: number): Float32Array {
    const activations = this.#forward(rows, n);
    const outputs = activations[activations.length - 1]!.dataSync<'float32'>();
    tf.dispose(activations);
    return outputs;
  }

  /** Outputs for n rows and their gradients with respect to the inputs, (n) and (n × inputs). */
  inputGradients(rows: Float32Array, n: number): { outputs: Float32Array; gradients: Float32Array } {
    const activations = this.#forward(rows, n);
    const outputs = activations[activations.length - 1]!.dataSync<'float32'>();
    let delta = tf.ones([n, 1]) as tf.Tensor2D;
    for (let layer = this.#weights.length - 1; layer >= 0; layer--) {
      const back = this.#throughWeights(delta, layer);
      delta.dispose();
      delta = layer === 0 ? back : throughActivation(back, activations[layer]!, this.#slope);
    }
    const gradients = delta.dataSync<'float32'>();
    tf.dispose([activations, delta]);
    return { outputs, gradients };
  }

  /**
   * Gradients of Σ_i c_i(outputs) · output_i with respect to the parameters, in the order of `parameterArrays`; the
   * caller turns outputs into the loss's derivative c by each of them.
   */
  parameterGradients(
    rows: Float32Array,
    n: number,
    lossDerivative: (outputs: Float32Array) => Float32Array,
  ): Float32Array[] {
    const activations = this.#forward(rows, n);
    const outputs = activations[activations.length - 1]!.dataSync<'float32'>();
    let delta: tf.Tensor2D = tf.tensor2d(lossDerivative(outputs), [n, 1]);
    const gradients: Float32Array[] = [];
    for (let layer = this.#weights.length - 1; layer >= 0; layer--) {
      const transposed = tf.transpose(activations[layer]!) as tf.Tensor2D;
      const weights = tf.matMul(transposed, delta);
      const biases = tf.sum(delta, 0);
      gradients.unshift(weights.dataSync<'float32'>(), biases.dataSync<'float32'>());
      tf.dispose([transposed, weights, biases]);
      const before = delta;
      if (layer > 0) {
        delta = throughActivation(this.#throughWeights(before, layer), activations[layer]!, this.#slope);
      }
      before.dispose();
    }
    tf.dispose(activations);
    return gradients;
  }

  /** The inputs and each layer's activations, outputs last. */
  #forward(rows: Float32Array, n: number): tf.Tensor2D[] {
    const activations: tf.Tensor2D[] = [tf.tensor2d(rows, [n, this.#weights[0]!.shape[0]])];
    this.#weights.forEach((weights, layer) => {
      const a = activations[layer]!;
      const bias = this.#biases[layer]!;
      const hidden = layer < this.#weights.length - 1;
      const next = hidden
        ? tf.fused.matMul({ a, b: weights, bias, activation: 'leakyrelu', leakyreluAlpha: this.#slope })
        : tf.fused.matMul({ a, b: weights, bias });
      activations.push(next as tf.Tensor2D);
    });
    return activations;
  }

  #throughWeights(delta: tf.Tensor2D, layer: number): tf.Tensor2D {
    this.#transposed[layer] ??= tf.transpose(this.#weights[layer]!) as tf.Tensor2D;
    return tf.matMul(delta, this.#transposed[layer]) as tf.Tensor2D;
  }
}

/** Multiplies by the derivative of the hidden units; frees its first argument. */
function throughActivation(back: tf.Tensor2D, activation: tf.Tensor2D, slope: number): tf.Tensor2D {
  const derivative = tf.step(activation, slope);
  const delta = tf.mul(back, derivative) as tf.Tensor2D;
  tf.dispose([back, derivative]);
  return delta;
}
