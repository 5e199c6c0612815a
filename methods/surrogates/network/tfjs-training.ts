import { type Matrix, takeRows } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import type { Stream } from '../../../harness/random.js';
import { ascentStep } from '../../ascent-step.js';
import type { Conservatism, Table } from '../../parts.js';
import { Adam } from './adam.js';
import { batchesOf } from './batches.js';
import type { NetworkSettings } from './network-settings.js';
import { freshParameters, type Parameters, parameterArrays } from './parameters.js';
import { DeviceNetwork } from './passes.js';
import { type InputScaling, makeScaling, scaleInputs, unscaleGradients } from './scaling.js';
import { standardize } from './standardize.js';
import { tfjsNetwork } from './tfjs-network.js';
import type { Network } from './trained-network.js';

/** How the weight of a conservative penalty reacts to over-estimation, a step. */
const weightRate = 0.01;

/** `trainNetwork` with the arithmetic of tfjs, whose backend has been started. */
export function trainOnTfjs(
  table: Table,
  settings: NetworkSettings,
  stream: Stream,
  conservatism: Conservatism | undefined,
): Network {
  const { encoding, x } = table;
  const { targets, scale } = standardize(table.scores);
  const widths = Array.from({ length: settings.layers }, () => settings.width);
  const parameters = freshParameters(encoding.width, widths, stream.split('parameters'));
  const adam = new Adam(parameterArrays(parameters), settings);
  const inputs = makeScaling(encoding);
  const penalty =
    conservatism === undefined ? undefined : new ConservativePenalty(encoding, inputs, conservatism);
  for (const rows of batchesOf(x.rows, settings, stream.split('batches'))) {
    const step = { x: takeRows(x, rows), targets: rows.map((row) => targets[row]!) };
    adam.step(gradientsOf(parameters, inputs, step, penalty));
  }
  return tfjsNetwork(encoding, parameters, scale);
}

interface TrainingStep {
  readonly x: Matrix;
  readonly targets: readonly number[];
}

function gradientsOf(
  parameters: Parameters,
  inputs: InputScaling,
  { x, targets }: TrainingStep,
  penalty: ConservativePenalty | undefined,
): Float32Array[] {
  const device = new DeviceNetwork(parameters);
  const mined = penalty?.mine(device, x);
  const rows =
    mined === undefined ? scaleInputs(inputs, x) : joined(scaleInputs(inputs, x), scaleInputs(inputs, mined));
  const n = x.rows + (mined?.rows ?? 0);
  const gradients = device.parameterGradients(rows, n, (outputs) => {
    const derivative = new Float32Array(n);
    targets.forEach((target, i) => {
      derivative[i] = (2 / targets.length) * (outputs[i]! - target);
    });
    penalty?.addDerivative(outputs, derivative, x.rows);
    return derivative;
  });
  device.dispose();
  return gradients;
}

/** Mines designs by ascent and weighs how far predictions there stand above those on the table. */
class ConservativePenalty {
  readonly #encoding: Encoding;
  readonly #inputs: InputScaling;
  readonly #conservatism: Conservatism;
  #weight: number;

  constructor(encoding: Encoding, inputs: InputScaling, conservatism: Conservatism) {
    this.#encoding = encoding;
    this.#inputs = inputs;
    this.#conservatism = conservatism;
    this.#weight = conservatism.weight;
  }

  /** Where an ascent of the present network takes the first of the step's rows. */
  mine(device: DeviceNetwork, x: Matrix): Matrix {
    const rows = Math.min(x.rows, this.#conservatism.rows);
    const mined = { rows, columns: x.columns, values: x.values.slice(0, rows * x.columns) };
    for (let step = 0; step < this.#conservatism.steps; step++) {
      const { gradients } = device.inputGradients(scaleInputs(this.#inputs, mined), mined.rows);
      const gradient = unscaleGradients(this.#inputs, gradients, 1);
      ascentStep(this.#encoding, mined, gradient, this.#conservatism.stepSize);
    }
    return mined;
  }

  /** Adds the penalty's derivative by each output; the first `rows` outputs are the table's, the rest mined ones. */
  addDerivative(outputs: Float32Array, derivative: Float32Array, rows: number): void {
    const { target } = this.#conservatism;
    const mined = outputs.length - rows;
    if (target !== undefined) {
      const excess = meanOf(outputs.subarray(rows)) - meanOf(outputs.subarray(0, rows)) - target;
      this.#weight = Math.max(0, this.#weight + weightRate * excess);
    }
    for (let i = 0; i < outputs.length; i++) {
      derivative[i]! += i < rows ? -this.#weight / rows : this.#weight / mined;
    }
  }
}

function joined(a: Float32Array, b: Float32Array): Float32Array {
  const both = new Float32Array(a.length + b.length);
  both.set(a);
  both.set(b, a.length);
  return both;
}

function meanOf(values: Float32Array): number {
  let sum = 0;
  for (const value of values) sum += value;
  return sum / values.length;
}
