import type { Encoding } from '../../../harness/encoding.js';
import type { Parameters } from '../network/parameters.js';
import type { Network, OutputScaling } from '../network/trained-network.js';
import { AskedNetworks } from './asked-networks.js';
import { takeKernel } from './kernel.js';
import { arrange, type KernelParameters, shapeOf } from './kernel-parameters.js';

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
  const asked = new AskedNetworks(encoding, [parameters], scaling);
  return {
    predict: (x) => asked.scores(x)[0]!,
    predictWithGradient: (x) => {
      const { scores, gradient } = asked.gradient(x, 0);
      return { scores: scores[0]!, gradient };
    },
  };
}
