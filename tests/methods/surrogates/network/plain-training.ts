import { matrixFromRows, rowView } from '../../../../harness/designs.js';
import { projectInPlace } from '../../../../harness/encoding.js';
import type { Stream } from '../../../../harness/random.js';
import type { Conservatism, Table } from '../../../../methods/parts.js';
import type { NetworkSettings } from '../../../../methods/surrogates/network/network-settings.js';
import { freshParameters, type Parameters } from '../../../../methods/surrogates/network/parameters.js';
import { makeScaling } from '../../../../methods/surrogates/network/scaling.js';
import { centralDifferences, differencesByParameters, plainOutput } from './plain-network.js';

/**
 * Training written out once more, slowly: plain loops in 64-bit floats, every gradient by central differences. For
 * training steps and conservatism that take in the whole table, so that the order of rows is of no account. Returns
 * the trained network's score for an encoded row.
 */
export function trainPlainly(
  { encoding, x, scores }: Table,
  settings: NetworkSettings,
  stream: Stream,
  conservatism?: Conservatism,
): (row: ArrayLike<number>) => number {
  const n = scores.length;
  const mean = average(Array.from(scores));
  const deviation = Math.sqrt(scores.reduce((sum, score) => sum + (score - mean) ** 2, 0) / (n - 1));
  const { shifts, factors } = makeScaling(encoding);
  const widths = new Array<number>(settings.layers).fill(settings.width);
  const parameters = freshParameters(encoding.width, widths, stream.split('parameters'));
  const outputOf = (at: Parameters, row: ArrayLike<number>) =>
    plainOutput(
      at,
      Array.from(row, (value, j) => (value - shifts[j]!) * factors[j]!),
    );
  const rows = Array.from({ length: n }, (_, i) => rowView(x, i));

  const mine = (row: Float64Array): Float64Array => {
    const mined = matrixFromRows([row]);
    for (let step = 0; step < conservatism!.steps; step++) {
      const gradient = centralDifferences(mined.values, (values) => outputOf(parameters, values));
      const rate = conservatism!.stepSize * Math.sqrt(encoding.width);
      gradient.forEach((slope, j) => {
        mined.values[j]! += rate * slope;
      });
      projectInPlace(encoding, mined);
    }
    return mined.values;
  };
  const adam = makeAdam(settings.learningRate);
  let weight = conservatism?.weight ?? 0;
  for (let step = 0; step < settings.steps; step++) {
    const mined = conservatism === undefined ? rows : rows.map(mine);
    const overestimation = (at: Parameters) =>
      average(mined.map((row) => outputOf(at, row))) - average(rows.map((row) => outputOf(at, row)));
    if (conservatism?.target !== undefined) {
      weight = Math.max(0, weight + 0.01 * (overestimation(parameters) - conservatism.target));
    }
    const loss = (at: Parameters) =>
      average(rows.map((row, i) => (outputOf(at, row) - (scores[i]! - mean) / deviation) ** 2)) +
      weight * overestimation(at);
    adam(parameters, differencesByParameters(parameters, loss));
  }
  return (row) => mean + deviation * outputOf(parameters, row);
}

/** Adam as in Kingma & Ba 2015, algorithm 1, with its recommended constants; changes the parameters. */
function makeAdam(learningRate: number): (parameters: Parameters, gradients: readonly number[][]) => void {
  const means = new Map<string, number>();
  const squares = new Map<string, number>();
  let step = 0;
  return (parameters, gradients) => {
    step += 1;
    const arrays = parameters.flatMap(({ weights, biases }) => [weights, biases]);
    gradients.forEach((gradient, k) => {
      gradient.forEach((g, i) => {
        const key = `${k} ${i}`;
        means.set(key, 0.9 * (means.get(key) ?? 0) + 0.1 * g);
        squares.set(key, 0.999 * (squares.get(key) ?? 0) + 0.001 * g * g);
        const mean = means.get(key)! / (1 - 0.9 ** step);
        const square = squares.get(key)! / (1 - 0.999 ** step);
        arrays[k]![i]! -= (learningRate * mean) / (Math.sqrt(square) + 1e-8);
      });
    });
  };
}

function average(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
