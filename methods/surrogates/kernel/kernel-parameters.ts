import type { Parameters } from '../network/parameters.js';
import { parameterArrays } from '../network/parameters.js';
import type { Kernel } from './kernel.js';
import { type NetworkShape, placeShape } from './network-shape.js';

/** A network's parameters as the kernel keeps them: in panels of eight units, filled up with zeros. */
export interface KernelParameters {
  readonly shape: NetworkShape;
  readonly panels: Float32Array;
}

/** Puts parameters in the kernel's memory, in its order; returns the addresses of shape and parameters. */
export function arrange(kernel: Kernel, parameters: Parameters): { shape: number; panels: number } {
  const { call, arena } = kernel;
  const shape = placeShape(kernel, shapeOf(parameters));
  const arrays = parameterArrays(parameters);
  const plain = new Float32Array(arrays.reduce((sum, array) => sum + array.length, 0));
  let at = 0;
  for (const array of arrays) {
    plain.set(array, at);
    at += array.length;
  }
  const panels = arena.reserve(call.parameterBytes(shape));
  call.arrangeParameters(shape, arena.place(plain), panels, 0);
  return { shape, panels };
}

/** Inputs and hidden widths of parameters given layer by layer. */
export function shapeOf(parameters: Parameters): NetworkShape {
  return {
    inputs: parameters[0]!.inputs,
    hidden: parameters.slice(0, -1).map((layer) => layer.outputs),
  };
}

/** Numbers in the kernel's panels as layers again, weights inputs × outputs row-major. */
export function readParameters(
  { call, arena }: Kernel,
  shape: number,
  { inputs, hidden }: NetworkShape,
  panels: number,
): Parameters {
  const widths = [inputs, ...hidden, 1];
  const count = widths.slice(1).reduce((sum, outputs, l) => sum + outputs * (1 + widths[l]!), 0);
  const plain = arena.reserve(4 * count);
  call.arrangeParameters(shape, plain, panels, 1);
  const numbers = arena.floats(plain, count);
  let at = 0;
  return widths.slice(1).map((outputs, l) => {
    const weights = numbers.subarray(at, at + widths[l]! * outputs);
    at += weights.length;
    const biases = numbers.subarray(at, at + outputs);
    at += outputs;
    return { inputs: widths[l]!, outputs, weights, biases };
  });
}
