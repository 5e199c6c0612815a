import { readFileSync } from 'node:fs';
import type { Parameters } from '../../../../methods/surrogates/network/parameters.js';

/** Weights and biases of the 2-4-1 network, or gradients by them; a weight matrix is (outputs, inputs). */
interface Layers {
  readonly W1: number[][];
  readonly b1: number[];
  readonly W2: number[][];
  readonly b2: number[];
}

interface Step {
  readonly output_before: number[];
  readonly parameters_after: Layers;
}

interface FullStep extends Step {
  readonly gradients: Layers;
  readonly input_gradient_of_output: number[][];
}

interface NetworkReference {
  readonly X: number[][];
  readonly y: number[];
  readonly initial: Layers;
  readonly tanh_adam_2_steps: readonly [FullStep, Step];
  readonly relu_adam_1_step: readonly [FullStep];
  readonly tanh_adamw_1_step_parameters_after: Layers;
}

/** Computed with torch 1.13 in float64; see the file's `source` field. */
export const reference = (
  JSON.parse(readFileSync(new URL('../../../reference/models.json', import.meta.url), 'utf8')) as {
    mlp: NetworkReference;
  }
).mlp;

/** The reference's layers as our parameters, whose weight matrices are (inputs, outputs). */
export function toParameters({ W1, b1, W2, b2 }: Layers): Parameters {
  return [
    { inputs: 2, outputs: 4, weights: transposed(W1), biases: Float32Array.from(b1) },
    { inputs: 4, outputs: 1, weights: transposed(W2), biases: Float32Array.from(b2) },
  ];
}

function transposed(rows: readonly number[][]): Float32Array {
  return Float32Array.from(rows[0]!.flatMap((_, j) => rows.map((row) => row[j]!)));
}
