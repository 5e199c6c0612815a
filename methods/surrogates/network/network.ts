import type { Matrix } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import { startBackend } from './backend.js';
import type { Parameters } from './parameters.js';
import { DeviceNetwork } from './passes.js';
import { type InputScaling, makeScaling, scaleInputs, unscaleGradients } from './scaling.js';

/** How a network's outputs become scores: score = mean + deviation · output. */
export interface OutputScaling {
  readonly mean: number;
  readonly deviation: number;
}

/** What a trained network can be asked; what trains it can be replaced behind this. */
export interface Network {
  /** Predicted scores of encoded rows, (n, width) to (n). */
  predict(x: Matrix): Float64Array;
  /** Predicted scores and their gradients with respect to the encoded rows, (n) and (n, width). */
  predictWithGradient(x: Matrix): { scores: Float64Array; gradient: Matrix };
}

/** A network with its scalings, ready to predict. Arithmetic in 32-bit floats. */
export async function makeNetwork(
  encoding: Encoding,
  parameters: Parameters,
  scaling: OutputScaling,
): Promise<Network> {
  await startBackend();
  const inputs = makeScaling(encoding);
  return {
    predict: (x) => onDevice(parameters, (device) => predictOn(device, inputs, scaling, x)),
    predictWithGradient: (x) =>
      onDevice(parameters, (device) => {
        const { outputs, gradients } = device.inputGradients(scaleInputs(inputs, x), x.rows);
        return {
          scores: toScores(outputs, scaling),
          gradient: unscaleGradients(inputs, gradients, scaling.deviation),
        };
      }),
  };
}

function predictOn(
  device: DeviceNetwork,
  inputs: InputScaling,
  scaling: OutputScaling,
  x: Matrix,
): Float64Array {
  return toScores(device.outputs(scaleInputs(inputs, x), x.rows), scaling);
}

function toScores(outputs: Float32Array, { mean, deviation }: OutputScaling): Float64Array {
  return Float64Array.from(outputs, (output) => mean + deviation * output);
}

function onDevice<T>(parameters: Parameters, use: (device: DeviceNetwork) => T): T {
  const device = new DeviceNetwork(parameters);
  try {
    return use(device);
  } finally {
    device.dispose();
  }
}
