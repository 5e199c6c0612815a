import fc from 'fast-check';
import { rootStream } from '../../../../harness/random.js';
import {
  freshParameters,
  type Parameters,
  parameterArrays,
} from '../../../../methods/surrogates/network/parameters.js';

/** A unit's output for its weighted input. */
export type Activation = (input: number) => number;

export const leaky: Activation = (input) => (input > 0 ? input : 0.3 * input);

/** The output of a network for one row: plain loops in 64-bit floats, against which the fast passes are held. */
export function plainOutput(parameters: Parameters, row: ArrayLike<number>, activation = leaky): number {
  let values = Array.from(row);
  parameters.forEach(({ outputs, weights, biases }, layer) => {
    const sums = Array.from({ length: outputs }, (_, o) =>
      values.reduce((sum, value, i) => sum + value * weights[i * outputs + o]!, biases[o]!),
    );
    values = layer < parameters.length - 1 ? sums.map(activation) : sums;
  });
  return values[0]!;
}

/** The same for rows of `width` numbers, one after another. */
export function plainOutputs(parameters: Parameters, rows: ArrayLike<number>, activation = leaky): number[] {
  const width = parameters[0]!.inputs;
  const values = Array.from(rows);
  return Array.from({ length: values.length / width }, (_, i) =>
    plainOutput(parameters, values.slice(i * width, (i + 1) * width), activation),
  );
}

/** The derivative of `f` by each entry of `at`, by central differences. */
export function centralDifferences(
  at: ArrayLike<number>,
  f: (values: Float64Array) => number,
  h = 1e-6,
): number[] {
  return Array.from(at, (value, i) => {
    const moved = Float64Array.from(at);
    moved[i] = value + h;
    const above = f(moved);
    moved[i] = value - h;
    return (above - f(moved)) / (2 * h);
  });
}

/** The gradient of a loss by all parameters, array by array in the order of `parameterArrays`. */
export function differencesByParameters(
  parameters: Parameters,
  loss: (parameters: Parameters) => number,
): number[][] {
  return parameterArrays(parameters).map((array, k) =>
    centralDifferences(array, (values) => loss(withArray(parameters, k, values))),
  );
}

/** The parameters with their k-th array exchanged for one of 64-bit floats. */
function withArray(parameters: Parameters, k: number, values: Float64Array): Parameters {
  const exchanged = values as unknown as Float32Array;
  return parameters.map((layer, i) => {
    if (i !== Math.floor(k / 2)) return layer;
    return k % 2 === 0 ? { ...layer, weights: exchanged } : { ...layer, biases: exchanged };
  });
}

export interface NetworkCase {
  readonly parameters: Parameters;
  /** Row-major, `n` rows. */
  readonly rows: Float32Array;
  readonly n: number;
}

/** Networks of odd and even shapes down to one input, one unit and one row, with rows to show them. */
export const arbitraryNetwork: fc.Arbitrary<NetworkCase> = fc
  .record({
    inputs: fc.constantFrom(1, 2, 5),
    widths: fc.array(fc.constantFrom(1, 3, 4, 9), { minLength: 1, maxLength: 3 }),
    n: fc.constantFrom(1, 2, 7, 16),
    seed: fc.nat(),
  })
  .map(({ inputs, widths, n, seed }) => {
    const stream = rootStream(seed);
    const draws = stream.split('rows');
    return {
      parameters: freshParameters(inputs, widths, stream.split('parameters')),
      rows: Float32Array.from({ length: n * inputs }, () => draws.normal()),
      n,
    };
  });

/** How fast-check runs: a fixed seed, so that a failure comes again. */
export const runs = { seed: 20260, numRuns: 40 } as const;
