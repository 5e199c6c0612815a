import type { Stream } from '../../../harness/random.js';

/** One dense layer: weights (inputs × outputs, row-major) and biases (outputs). */
export interface LayerParameters {
  readonly inputs: number;
  readonly outputs: number;
  readonly weights: Float32Array;
  readonly biases: Float32Array;
}

/** A multilayer perceptron: hidden layers in order, then one output. */
export type Parameters = readonly LayerParameters[];

/**
 * Fresh parameters for a network of the given hidden widths and one output: weights and biases uniform within
 * ±1/√inputs (LeCun et al. 1998, section 4.6, as common frameworks scale it).
 */
export function freshParameters(inputs: number, hiddenWidths: readonly number[], stream: Stream): Parameters {
  const widths = [inputs, ...hiddenWidths, 1];
  return hiddenWidths.concat(1).map((outputs, layer) => {
    const fanIn = widths[layer]!;
    const bound = 1 / Math.sqrt(fanIn);
    const draw = () => (2 * stream.uniform() - 1) * bound;
    return {
      inputs: fanIn,
      outputs,
      weights: Float32Array.from({ length: fanIn * outputs }, draw),
      biases: Float32Array.from({ length: outputs }, draw),
    };
  });
}

/** All arrays of the parameters, weights before biases, layer by layer. */
export function parameterArrays(parameters: Parameters): Float32Array[] {
  return parameters.flatMap((layer) => [layer.weights, layer.biases]);
}
