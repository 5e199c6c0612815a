import { type Matrix, zeros } from '../../../harness/designs.js';
import type { Model, Prediction } from '../../parts.js';
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
    predict: (x) => summarize(networks.map((network) => network.predict(x))),
    gradient: (x, spreadWeight) => gradientOfBound(networks, x, spreadWeight),
  };
}

function summarize(predictions: readonly Float64Array[]): Required<Prediction> {
  const members = predictions.length;
  const rows = predictions[0]!.length;
  const mean = new Float64Array(rows);
  const spread = new Float64Array(rows);
  for (let i = 0; i < rows; i++) {
    // Summed as differences to the first member, so that members that agree have no spread from rounding.
    const first = predictions[0]![i]!;
    let sum = 0;
    for (const member of predictions) sum += member[i]! - first;
    mean[i] = first + sum / members;
    let squares = 0;
    for (const member of predictions) squares += (member[i]! - mean[i]!) ** 2;
    spread[i] = Math.sqrt(squares / (members - 1));
  }
  return { mean, spread };
}

/**
 * Gradient of mean − w · spread: Σ_m g_m · (1/M − w · (f_m − mean) / ((M − 1) · spread)). Where all members agree the
 * spread has no gradient and only the mean's is taken.
 */
function gradientOfBound(networks: readonly Network[], x: Matrix, spreadWeight: number): Matrix {
  const members = networks.map((network) => network.predictWithGradient(x));
  const { mean, spread } = summarize(members.map((member) => member.scores));
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
