import type { Matrix } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import type { Parameters } from '../network/parameters.js';
import type { Network, OutputScaling } from '../network/trained-network.js';
import { type Kernel, takeKernel } from './kernel.js';
import { arrange, type KernelParameters, shapeOf } from './kernel-parameters.js';
import { placeShape, useEncoding, useNetworks } from './network-shape.js';

/** A network of given parameters whose arithmetic is the kernel's. */
export function kernelNetworkOf(encoding: Encoding, parameters: Parameters, scaling: OutputScaling): Network {
  const kernel = takeKernel();
  const { shape, panels } = arrange(kernel, parameters);
  const kept = kernel.arena.floats(panels, kernel.call.parameterBytes(shape) / 4);
  return kernelNetwork(encoding, { shape: shapeOf(parameters), panels: kept }, scaling);
}

/** The same from parameters in the kernel's order. */
export function kernelNetwork(
  encoding: Encoding,
  parameters: KernelParameters,
  scaling: OutputScaling,
): Network {
  const prepare = (): Kernel => {
    const kernel = takeKernel();
    useEncoding(kernel, encoding);
    const shape = placeShape(kernel, parameters.shape);
    useNetworks(kernel, shape, kernel.arena.place(parameters.panels), {});
    return kernel;
  };
  return {
    predict: (x) => {
      const { call, arena } = prepare();
      const outputs = arena.reserve(4 * x.rows);
      call.predict(arena.place(x.values), x.rows, outputs);
      return toScores(arena.floats(outputs, x.rows), scaling);
    },
    predictWithGradient: (x) => {
      const { call, arena } = prepare();
      call.transposeMembers(1);
      const outputs = arena.reserve(4 * x.rows);
      const gradient = arena.reserve(8 * x.values.length);
      call.gradients(arena.place(x.values), x.rows, outputs, gradient, 0, scaling.deviation);
      return {
        scores: toScores(arena.floats(outputs, x.rows), scaling),
        gradient: likeRows(x, arena.doubles(gradient, x.values.length)),
      };
    },
  };
}

function toScores(outputs: Float32Array, { mean, deviation }: OutputScaling): Float64Array {
  return Float64Array.from(outputs, (output) => mean + deviation * output);
}

function likeRows({ rows, columns }: Matrix, values: Float64Array): Matrix {
  return { rows, columns, values };
}
