import * as tf from '@tensorflow/tfjs-core';
import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { useBackend } from '../../../../methods/surrogates/network/backend.js';
import { leak } from '../../../../methods/surrogates/network/leak.js';
import { type Parameters, parameterArrays } from '../../../../methods/surrogates/network/parameters.js';
import { DeviceNetwork } from '../../../../methods/surrogates/network/passes.js';
import { expectClose } from './expect-close.js';
import {
  arbitraryNetwork,
  centralDifferences,
  differencesByParameters,
  plainOutputs,
  runs,
} from './plain-network.js';
import { reference, toParameters } from './reference.js';

beforeAll(() => useBackend('wasm'));

/** Frees the network even where an expectation fails. */
function withNetwork<T>(parameters: Parameters, use: (network: DeviceNetwork) => T, slope = leak): T {
  const network = new DeviceNetwork(parameters, slope);
  try {
    return use(network);
  } finally {
    network.dispose();
  }
}

/** Derivative of mean squared error against alternating targets by each output. */
const target = (i: number): number => (i % 2 === 0 ? 0.5 : -1);
const errorDerivative = (outputs: Float32Array): Float32Array =>
  outputs.map((output, i) => (2 / outputs.length) * (output - target(i)));
const squaredError = (outputs: readonly number[]): number =>
  outputs.reduce((sum, output, i) => sum + (output - target(i)) ** 2, 0) / outputs.length;

describe('DeviceNetwork with slope 0 agrees with torch on a 2-4-1 network of rectified units', () => {
  const rows = Float32Array.from(reference.X.flat());
  const [step] = reference.relu_adam_1_step;

  test('outputs(rows, n)', () => {
    withNetwork(
      toParameters(reference.initial),
      (network) => expectClose(network.outputs(rows, 3), step.output_before, 1e-6),
      0,
    );
  });

  test('inputGradients(rows, n)', () => {
    const { outputs, gradients } = withNetwork(
      toParameters(reference.initial),
      (network) => network.inputGradients(rows, 3),
      0,
    );
    expectClose(outputs, step.output_before, 1e-6);
    expectClose(gradients, step.input_gradient_of_output.flat(), 1e-6);
  });

  test('parameterGradients(rows, n, lossDerivative)', () => {
    const gradients = withNetwork(
      toParameters(reference.initial),
      (network) =>
        network.parameterGradients(rows, 3, (outputs) =>
          outputs.map((output, i) => (2 / 3) * (output - reference.y[i]!)),
        ),
      0,
    );
    const expected = parameterArrays(toParameters(step.gradients));
    expected.forEach((array, k) => {
      expectClose(gradients[k]!, array, 1e-6, `array ${k}`);
    });
    expect(gradients).toHaveLength(4);
  });
});

describe('DeviceNetwork with its leaky units, on networks of any shape', () => {
  test('outputs(rows, n) are those of plain loops in 64-bit floats', () => {
    fc.assert(
      fc.property(arbitraryNetwork, ({ parameters, rows, n }) => {
        const outputs = withNetwork(parameters, (network) => network.outputs(rows, n));
        expectClose(outputs, plainOutputs(parameters, rows), 2e-6);
      }),
      runs,
    );
  });

  test('inputGradients(rows, n) are central differences of plain loops', () => {
    fc.assert(
      fc.property(arbitraryNetwork, ({ parameters, rows, n }) => {
        const { outputs, gradients } = withNetwork(parameters, (network) => network.inputGradients(rows, n));
        // An output depends on its own row alone, so the sum of all has each one's gradient in its row.
        const sum = (values: Float64Array) => plainOutputs(parameters, values).reduce((a, b) => a + b, 0);
        expectClose(outputs, plainOutputs(parameters, rows), 2e-6);
        expectClose(gradients, centralDifferences(rows, sum), 2e-6);
      }),
      runs,
    );
  });

  test('parameterGradients(rows, n, lossDerivative) are central differences of plain loops', () => {
    fc.assert(
      fc.property(arbitraryNetwork, ({ parameters, rows, n }) => {
        const gradients = withNetwork(parameters, (network) =>
          network.parameterGradients(rows, n, errorDerivative),
        );
        const loss = (moved: Parameters) => squaredError(plainOutputs(moved, rows));
        const expected = differencesByParameters(parameters, loss);
        expect(gradients).toHaveLength(expected.length);
        expected.forEach((array, k) => {
          expectClose(gradients[k]!, array, 5e-6, `array ${k}`);
        });
      }),
      runs,
    );
  });

  test('all passes free every tensor they make', () => {
    fc.assert(
      fc.property(arbitraryNetwork, ({ parameters, rows, n }) => {
        const { numTensors, numBytes } = tf.memory();
        withNetwork(parameters, (network) => {
          network.outputs(rows, n);
          network.inputGradients(rows, n);
          network.parameterGradients(rows, n, errorDerivative);
          network.inputGradients(rows, n);
        });
        expect(tf.memory()).toMatchObject({ numTensors, numBytes });
      }),
      runs,
    );
  });
});

test('a row gives the same output alone and among others', () => {
  fc.assert(
    fc.property(arbitraryNetwork, ({ parameters, rows, n }) => {
      withNetwork(parameters, (network) => {
        const width = rows.length / n;
        const alone = network.outputs(rows.slice(0, width), 1);
        expectClose(alone, network.outputs(rows, n).subarray(0, 1), 1e-6);
      });
    }),
    runs,
  );
});
