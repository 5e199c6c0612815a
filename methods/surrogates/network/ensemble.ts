import { type Matrix, zeros } from '../../../harness/designs.js';
import type { Model } from '../../parts.js';
import { meanAndSpread } from './mean-and-spread.js';
import type { Network } from './trained-network.js';

/** One network as a model: a mean, no idea of its own error. */
export function modelOfNetwork(network: Network): Model {
  return {
    predict: (x) => ({ mean: network.predict(x) }),
    gradient: (x) => network.predictWithGradient(x).gradient,
  };
}

/** Several networks as a model: their mean, and their standard deviation (n − 1) as the spread. */
export function modelOfEnsemble(networks: readonly Network[]): Model {
  return {
    predict: (x) => meanAndSpread(networks.map((network) => network.predict(x))),
    gradient: (x, spreadWeight) => gradientOfBound(networks, x, spreadWeight),
  };
}

/**
 * Gradient of mean − w · spread: Σ_m g_m · (1/M − w · (f_m − mean) / ((M − 1) · spread)). Where all members agree the
 * spread has no gradient and only the mean's is taken.
 */
function gradientOfBound(networks: readonly Network[], x: Matrix, spreadWeight: number): Matrix {
  const members = networks.map((network) => network.predictWithGradient(x));
  const { mean, spread } = meanAndSpread(members.map((member) => member.scores));
  const gradient = zeros(x.rows, x.columns);
  for (const { scores, gradient: slope } of members) {
    for (let i = 0; i < x.rows; i++) {
      const doubt = spread[i]! > 0 ? (scores[i]! - mean[i]!) / ((members.length - 1) * spread[i]!) : 0;
      const share = 1 / members.length - spreadWeight * doubt;
      for (let k = i * x.columns; k < (i + 1) * x.columns; k++) {
        gradient.values[k]! += share * slope.values[k]!;
      }
    }
  }
  return gradient;
}
