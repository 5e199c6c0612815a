import type { Matrix } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import type { Parameters } from './parameters.js';
import { DeviceNetwork } from './passes.js';
import { type InputScaling, makeScaling, scaleInputs, unscaleGradients } from './scaling.js';
import type { Network, OutputScaling } from './trained-network.js';

/** A network of given parameters whose arithmetic is that of tfjs; its backend has been started. */
export function tfjsNetwork(encoding: Encoding, parameters: Parameters, scaling: OutputScaling): Network {
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
