import { z } from 'zod';
import { type Matrix, takeRows } from '../../../harness/designs.js';
import type { Encoding } from '../../../harness/encoding.js';
import { type Stream, shuffleInPlace } from '../../../harness/random.js';
import { ascentStep } from '../../ascent-step.js';
import type { Conservatism, Table } from '../../parts.js';
import { scoreScale } from '../../table.js';
import { Adam } from './adam.js';
import { startBackend } from './backend.js';
import { makeNetwork, type Network } from './network.js';
import { freshParameters, type Parameters, parameterArrays } from './parameters.js';
import { DeviceNetwork } from './passes.js';
import { type InputScaling, makeScaling, scaleInputs, unscaleGradients } from './scaling.js';

/** Settings of one network and its training. */
export const networkSettings = z.strictObject({
  width: z.int().min(1).max(4096).default(64).describe('units in each hidden layer'),
  layers: z.int().min(1).max(8).default(2).describe('hidden layers'),
  steps: z.int().min(1).default(300).describe('training steps'),
  batch: z.int().min(1).default(64).describe('rows in a training step'),
  learningRate: z.number().positive().default(0.002).describe('step size of Adam'),
  weightDecay: z.number().min(0).default(0).describe('decoupled weight decay'),
});

export type NetworkSettings = z.output<typeof networkSettings>;

/** How the weight of a conservative penalty reacts to over-estimation, a step. */
const weightRate = 0.01;

/**
 * Trains one network on the table: squared error on standardized scores, Adam, rows in seeded random order.
 *
 * With `conservatism` it minimizes the conservative training objective (conservative objective models, ICML 2021):
 * squared error + weight · (mean prediction at designs mined by ascent from the step's rows − mean prediction at the
 * rows themselves). With a target the weight follows dual ascent: it grows while the over-estimation of mined designs
 * is above the target and falls towards 0 below it.
 */
export async function trainNetwork(
  table: Table,
  settings: NetworkSettings,
  stream: Stream,
  conservatism?: Conservatism,
): Promise<Network> {
  await startBackend();
  const { encoding, x } = table;
  const scale = scoreScale(table.scores);
  const targets = Float64Array.from(table.scores, (score) => (score - scale.mean) / scale.deviation);
  const widths = Array.from({ length: settings.layers }, () => settings.width);
  const parameters = freshParameters(encoding.width, widths, stream.split('parameters'));
  const adam = new Adam(parameterArrays(parameters), settings);
  const inputs = makeScaling(encoding);
  const penalty =
    conservatism === undefined ? undefined : new ConservativePenalty(encoding, inputs, conservatism);
  for (const rows of batches(x.rows, settings, stream.split('batches'))) {
    const step = { x: takeRows(x, rows), targets: rows.map((row) => targets[row]!) };
    adam.step(gradientsOf(parameters, inputs, step, penalty));
  }
  return makeNetwork(encoding, parameters, scale);
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

/** Row numbers of each training step: the rows in a fresh random order each time they have all been used. */
function* batches(rows: number, { steps, batch }: NetworkSettings, stream: Stream): Generator<number[]> {
  let order: number[] = [];
  for (let step = 0; step < steps; step++) {
    if (order.length === 0) {
      order = shuffleInPlace(
        Array.from({ length: rows }, (_, i) => i),
        stream,
      );
    }
    yield order.splice(0, batch);
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
