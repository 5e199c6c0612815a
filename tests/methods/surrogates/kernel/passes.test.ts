import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { Adam } from '../../../../methods/surrogates/network/adam.js';
import { useBackend } from '../../../../methods/surrogates/network/backend.js';
import { type Parameters, parameterArrays } from '../../../../methods/surrogates/network/parameters.js';
import { DeviceNetwork } from '../../../../methods/surrogates/network/passes.js';
import { expectClose } from '../network/expect-close.js';
import {
  arbitraryNetwork,
  centralDifferences,
  differencesByParameters,
  plainOutputs,
  runs,
} from '../network/plain-network.js';
import { reference, toParameters } from '../network/reference.js';
import { kernelInputGradients, kernelLossGradient, kernelOutputs, kernelTraining } from './kernel-passes.js';

const targetsOf = (n: number): number[] => Array.from({ length: n }, (_, i) => (i % 2 === 0 ? 0.5 : -1));
const squaredError = (outputs: readonly number[]): number =>
  outputs.reduce((sum, output, i) => sum + (output - targetsOf(outputs.length)[i]!) ** 2, 0) / outputs.length;

const expectParameters = (actual: Parameters, expected: Parameters, tolerance: number): void => {
  expect(actual).toHaveLength(expected.length);
  parameterArrays(expected).forEach((array, k) => {
    expectClose(parameterArrays(actual)[k]!, array, tolerance, `array ${k}`);
  });
};

describe('the kernel agrees with torch on a 2-4-1 network of rectified units', () => {
  const [step] = reference.relu_adam_1_step;
  const passes = { parameters: toParameters(reference.initial), rows: reference.X.flat(), n: 3, slope: 0 };

  test('in outputs and their gradients by the inputs', () => {
    expectClose(kernelOutputs(passes), step.output_before, 1e-6);
    const { outputs, gradients } = kernelInputGradients(passes);
    expectClose(outputs, step.output_before, 1e-6);
    expectClose(gradients, step.input_gradient_of_output.flat(), 1e-6);
  });

  test('in the gradient of mean squared error', () => {
    const { gradient } = kernelLossGradient(passes, reference.y);
    expectParameters(gradient, toParameters(step.gradients), 1e-6);
  });

  test('in a step of Adam', () => {
    const settings = { steps: 1, learningRate: 0.01, weightDecay: 0 };
    const { parameters } = kernelTraining(passes, reference.y, settings);
    expectParameters(parameters, toParameters(step.parameters_after), 1e-7);
  });
});

describe('the kernel on networks of any shape, down to one input, one unit and one row', () => {
  test('has the outputs of plain loops in 64-bit floats', () => {
    fc.assert(
      fc.property(arbitraryNetwork, (network) => {
        expectClose(kernelOutputs(network), plainOutputs(network.parameters, network.rows), 2e-6);
      }),
      runs,
    );
  });

  test('has the input gradients of central differences', () => {
    fc.assert(
      fc.property(arbitraryNetwork, (network) => {
        const sum = (values: Float64Array) =>
          plainOutputs(network.parameters, values).reduce((a, b) => a + b, 0);
        const { outputs, gradients } = kernelInputGradients(network);
        expectClose(outputs, plainOutputs(network.parameters, network.rows), 2e-6);
        expectClose(gradients, centralDifferences(network.rows, sum), 2e-6);
      }),
      runs,
    );
  });

  test('has the loss and the parameter gradients of central differences', () => {
    fc.assert(
      fc.property(arbitraryNetwork, (network) => {
        const lossOf = (moved: Parameters) => squaredError(plainOutputs(moved, network.rows));
        const { loss, gradient } = kernelLossGradient(network, targetsOf(network.n));
        expect(loss).toBeCloseTo(lossOf(network.parameters), 5);
        const expected = differencesByParameters(network.parameters, lossOf);
        parameterArrays(gradient).forEach((array, k) => {
          expectClose(array, expected[k]!, 5e-6, `array ${k}`);
        });
      }),
      runs,
    );
  });

  test('gives a row the same output, to the last bit, alone and among others', () => {
    fc.assert(
      fc.property(arbitraryNetwork, (network) => {
        const { rows, n } = network;
        const all = kernelOutputs(network);
        for (let i = 0; i < n; i++) {
          const alone = rows.slice((i * rows.length) / n, ((i + 1) * rows.length) / n);
          expect(kernelOutputs({ ...network, rows: alone, n: 1 })[0]).toBe(all[i]);
        }
      }),
      runs,
    );
  });
});

describe('the kernel agrees with tfjs and Adam in plain loops', () => {
  beforeAll(() => useBackend('wasm'));

  test('over several steps with weight decay, within the rounding of 32-bit floats', () => {
    fc.assert(
      fc.property(arbitraryNetwork, fc.constantFrom(0, 0.1), (network, weightDecay) => {
        const { parameters, rows, n } = network;
        const settings = { steps: 4, learningRate: 0.01, weightDecay };
        const trained = kernelTraining(network, targetsOf(n), settings);
        const copied = parameters.map((layer) => ({
          ...layer,
          weights: layer.weights.slice(),
          biases: layer.biases.slice(),
        }));
        const adam = new Adam(parameterArrays(copied), settings);
        for (let step = 0; step < settings.steps; step++) {
          const device = new DeviceNetwork(copied);
          adam.step(
            device.parameterGradients(rows, n, (outputs) =>
              outputs.map((output, i) => (2 / n) * (output - targetsOf(n)[i]!)),
            ),
          );
          device.dispose();
        }
        // The rounding of a gradient near zero is of its own size, and Adam moves by up to a learning rate a step
        // whatever the gradient's size; outputs, not single parameters, are what must agree.
        expectClose(plainOutputs(trained.parameters, rows), plainOutputs(copied, rows), 2e-4);
      }),
      runs,
    );
  });
});
