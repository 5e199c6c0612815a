import type { Encoding } from '../../../harness/encoding.js';
import type { Model } from '../../parts.js';
import { meanAndSpread } from '../network/mean-and-spread.js';
import type { OutputScaling } from '../network/trained-network.js';
import { AskedNetworks } from './asked-networks.js';
import type { KernelParameters } from './kernel-parameters.js';

/** Several networks trained on one table as a model, as `modelOfEnsemble` makes it, each question one call. */
export function kernelEnsemble(
  encoding: Encoding,
  members: readonly KernelParameters[],
  scaling: OutputScaling,
): Model {
  const asked = new AskedNetworks(encoding, members, scaling);
  return {
    predict: (x) => meanAndSpread(asked.scores(x)),
    gradient: (x, spreadWeight) => asked.gradient(x, spreadWeight).gradient,
  };
}
