import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { Adam } from '../../../../methods/surrogates/network/adam.js';
import { type Parameters, parameterArrays } from '../../../../methods/surrogates/network/parameters.js';
import { expectClose } from './expect-close.js';
import { differencesByParameters, plainOutputs } from './plain-network.js';
import { reference, toParameters } from './reference.js';

/** Parameters are kept in 32-bit floats: half a unit in the last place of 0.6 is 3e-8, once a step. */
const rounding = 1e-7;

const expectParameters = (actual: Parameters, expected: Parameters): void =>
  parameterArrays(expected).forEach((array, k) => {
    expectClose(parameterArrays(actual)[k]!, array, rounding, `array ${k}`);
  });

const [first, second] = reference.tanh_adam_2_steps;
const plain = { learningRate: 0.01, weightDecay: 0 };

describe('Adam.step(gradients) agrees with torch', () => {
  test('on the first step of a network of rectified units', () => {
    const [step] = reference.relu_adam_1_step;
    const parameters = toParameters(reference.initial);
    new Adam(parameterArrays(parameters), plain).step(parameterArrays(toParameters(step.gradients)));
    expectParameters(parameters, toParameters(step.parameters_after));
  });

  test('on two steps of a network of hyperbolic tangents', () => {
    const parameters = toParameters(reference.initial);
    const adam = new Adam(parameterArrays(parameters), plain);
    adam.step(parameterArrays(toParameters(first.gradients)));
    expectParameters(parameters, toParameters(first.parameters_after));
    adam.step(tanhGradients(parameters));
    expectParameters(parameters, toParameters(second.parameters_after));
  });

  test('on a step with decoupled weight decay 0.1', () => {
    const parameters = toParameters(reference.initial);
    const adam = new Adam(parameterArrays(parameters), { learningRate: 0.01, weightDecay: 0.1 });
    adam.step(parameterArrays(toParameters(first.gradients)));
    expectParameters(parameters, toParameters(reference.tanh_adamw_1_step_parameters_after));
  });
});

test('the tanh gradients of the second step come from a function that has those of the first', () => {
  const parameters = toParameters(reference.initial);
  const expected = parameterArrays(toParameters(first.gradients));
  tanhGradients(parameters).forEach((array, k) => {
    expectClose(array, expected[k]!, rounding, `array ${k}`);
  });
  expectClose(plainOutputs(parameters, reference.X.flat(), Math.tanh), first.output_before, rounding);
});

test('Adam.step(gradients) first moves every parameter by the learning rate against its gradient, whatever its size', () => {
  fc.assert(
    fc.property(fc.array(fc.double({ min: 1e-4, max: 1e4, noNaN: true }), { minLength: 1 }), (sizes) => {
      const targets = new Float32Array(sizes.length);
      const gradient = Float32Array.from(sizes, (size, i) => (i % 2 === 0 ? size : -size));
      new Adam([targets], { learningRate: 0.5, weightDecay: 0 }).step([gradient]);
      // Kingma & Ba 2015, section 2.1; ε = 1e-8 takes off at most 1e-4 of it here.
      targets.forEach((value, i) => {
        expect(value * (i % 2 === 0 ? -1 : 1)).toBeCloseTo(0.5, 3);
      });
    }),
    { seed: 20260, numRuns: 50 },
  );
});

test('Adam.step(gradients) finds the minimum of a badly scaled quadratic', () => {
  const scales = [1, 100, 10_000];
  const targets = Float32Array.of(1, -2, 3);
  const adam = new Adam([targets], { learningRate: 0.01, weightDecay: 0 });
  for (let step = 0; step < 2000; step++) adam.step([targets.map((value, i) => scales[i]! * value)]);
  expectClose(targets, [0, 0, 0], 1e-3);
});

/** Gradients of mean squared error for the reference's table, by central differences in 64-bit floats. */
function tanhGradients(parameters: Parameters): Float32Array[] {
  const loss = (moved: Parameters) =>
    plainOutputs(moved, reference.X.flat(), Math.tanh).reduce(
      (sum, output, i) => sum + (output - reference.y[i]!) ** 2 / 3,
      0,
    );
  return differencesByParameters(parameters, loss).map((array) => Float32Array.from(array));
}
