import type { Encoding } from '../../../harness/encoding.js';
import type { Stream } from '../../../harness/random.js';
import type { Conservatism, Model, Table } from '../../parts.js';
import { batchesOf } from '../network/batches.js';
import type { NetworkSettings } from '../network/network-settings.js';
import { freshParameters } from '../network/parameters.js';
import { standardize } from '../network/standardize.js';
import type { Network, OutputScaling } from '../network/trained-network.js';
import { type Kernel, takeKernel } from './kernel.js';
import { kernelEnsemble } from './kernel-ensemble.js';
import { kernelNetwork } from './kernel-network.js';
import { arrange, type KernelParameters, shapeOf } from './kernel-parameters.js';
import { useEncoding, useNetworks } from './network-shape.js';

/** Row numbers handed to the kernel in one call, at most: many epochs of a small table. */
const rowsACall = 65_536;

/** `trainNetwork` with the kernel's arithmetic: all training steps in one call, or few. */
export function trainOnKernel(
  table: Table,
  settings: NetworkSettings,
  stream: Stream,
  conservatism: Conservatism | undefined,
): Network {
  const { parameters, scaling } = trainParameters(table, settings, stream, conservatism);
  return kernelNetwork(table.encoding, parameters, scaling);
}

/** Trains one network for each stream, and has them asked together. */
export function trainEnsembleOnKernel(
  table: Table,
  settings: NetworkSettings,
  streams: readonly Stream[],
  conservatism: Conservatism | undefined,
): Model {
  const members = streams.map((stream) => trainParameters(table, settings, stream, conservatism));
  return kernelEnsemble(
    table.encoding,
    members.map(({ parameters }) => parameters),
    members[0]!.scaling,
  );
}

function trainParameters(
  table: Table,
  settings: NetworkSettings,
  stream: Stream,
  conservatism: Conservatism | undefined,
): { parameters: KernelParameters; scaling: OutputScaling } {
  const { encoding, x } = table;
  const { targets, scale: scaling } = standardize(table.scores);
  const widths = Array.from({ length: settings.layers }, () => settings.width);
  const parameters = freshParameters(encoding.width, widths, stream.split('parameters'));
  const kernel = takeKernel();
  const { call, arena } = kernel;
  useEncoding(kernel, encoding);
  const { shape, panels } = arrange(kernel, parameters);
  const bytes = call.parameterBytes(shape);
  const mostRows = Math.min(settings.batch, x.rows);
  useNetworks(kernel, shape, panels, { rows: mostRows + Math.min(mostRows, conservatism?.rows ?? 0) });
  beConservative(kernel, encoding, conservatism);
  const rows = arena.place(x.values);
  call.beginTraining(
    rows,
    x.rows,
    arena.place(targets),
    arena.reserve(call.tableBytes(rows, x.rows)),
    arena.reserve(3 * bytes),
    settings.learningRate,
    settings.weightDecay,
  );
  trainInCalls(kernel, batchesOf(x.rows, settings, stream.split('batches')), mostRows);
  return { parameters: { shape: shapeOf(parameters), panels: arena.floats(panels, bytes / 4) }, scaling };
}

function beConservative(
  { call, arena }: Kernel,
  encoding: Encoding,
  { rows, steps, stepSize, weight, target }: Conservatism = { rows: 0, steps: 0, stepSize: 0, weight: 0 },
): void {
  const rate = stepSize * Math.sqrt(encoding.width);
  const scratch = arena.reserve(2 * 8 * rows * encoding.width);
  call.useConservatism(rows, steps, rate, weight, target === undefined ? 0 : 1, target ?? 0, scratch);
}

function trainInCalls({ call, arena }: Kernel, batches: Iterable<readonly number[]>, mostRows: number): void {
  const capacity = Math.max(rowsACall, mostRows);
  const order = arena.reserve(4 * capacity);
  const sizes = arena.reserve(4 * capacity);
  const losses = arena.reserve(8 * capacity);
  let rows = 0;
  let steps = 0;
  const run = () => {
    call.train(order, sizes, steps, losses);
    rows = 0;
    steps = 0;
  };
  for (const batch of batches) {
    if (rows + batch.length > capacity) run();
    arena.integers(order + 4 * rows, batch.length).set(batch);
    arena.integers(sizes + 4 * steps, 1)[0] = batch.length;
    rows += batch.length;
    steps += 1;
  }
  run();
}
