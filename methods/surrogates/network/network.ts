import type { Encoding } from '../../../harness/encoding.js';
import { kernelNetworkOf } from '../kernel/kernel-network.js';
import { startBackend } from './backend.js';
import type { Parameters } from './parameters.js';
import type { Network, OutputScaling } from './trained-network.js';

/** A network with its scalings, ready to predict. Arithmetic in 32-bit floats. */
export async function makeNetwork(
  encoding: Encoding,
  parameters: Parameters,
  scaling: OutputScaling,
): Promise<Network> {
  const backend = await startBackend();
  if (backend === 'kernel') return kernelNetworkOf(encoding, parameters, scaling);
  const { tfjsNetwork } = await import('./tfjs-network.js');
  return tfjsNetwork(encoding, parameters, scaling);
}
