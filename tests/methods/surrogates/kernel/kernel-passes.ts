import { type Kernel, takeKernel } from '../../../../methods/surrogates/kernel/kernel.js';
import {
  arrange,
  type KernelParameters,
  readParameters,
  shapeOf,
} from '../../../../methods/surrogates/kernel/kernel-parameters.js';
import { useNetworks } from '../../../../methods/surrogates/kernel/network-shape.js';
import { leak } from '../../../../methods/surrogates/network/leak.js';
import type { Parameters } from '../../../../methods/surrogates/network/parameters.js';

/** Unscaled rows with a target each, shown to one network. */
export interface Passes {
  readonly parameters: Parameters;
  /** Row-major, `n` rows. */
  readonly rows: ArrayLike<number>;
  readonly n: number;
  readonly slope?: number;
}

interface Placed {
  readonly kernel: Kernel;
  readonly shape: number;
  readonly panels: number;
  readonly x: number;
}

/** Puts a network and its rows, taken as inputs as they are, in the kernel's memory. */
function place({ parameters, rows, n, slope = leak }: Passes): Placed {
  const kernel = takeKernel();
  const { call, arena } = kernel;
  const inputs = rows.length / n;
  const ones = new Float64Array(inputs).fill(1);
  call.useSpace(inputs, 0, 0, arena.place(new Float64Array(inputs)), arena.place(ones));
  const { shape, panels } = arrange(kernel, parameters);
  useNetworks(kernel, shape, panels, { rows: n, slope });
  return { kernel, shape, panels, x: arena.place(Float64Array.from(rows)) };
}

/** The network's outputs, (n). */
export function kernelOutputs(passes: Passes): Float32Array {
  const { kernel, x } = place(passes);
  const outputs = kernel.arena.reserve(4 * passes.n);
  kernel.call.predict(x, passes.n, outputs);
  return kernel.arena.floats(outputs, passes.n);
}

/** Outputs and their gradients by the rows, (n) and (n, inputs). */
export function kernelInputGradients(passes: Passes): { outputs: Float32Array; gradients: Float64Array } {
  const { n, rows } = passes;
  const { kernel, x } = place(passes);
  const { call, arena } = kernel;
  const outputs = arena.reserve(4 * n);
  const gradient = arena.reserve(8 * rows.length);
  call.transposeMembers(1);
  call.gradients(x, n, outputs, gradient, 0, 1);
  return { outputs: arena.floats(outputs, n), gradients: arena.doubles(gradient, rows.length) };
}

/** Mean squared error against targets, and its gradient by the parameters. */
export function kernelLossGradient(
  passes: Passes,
  targets: ArrayLike<number>,
): { loss: number; gradient: Parameters } {
  const placed = place(passes);
  const { kernel, shape } = placed;
  const moments = begin(placed, passes, targets, { learningRate: 1, weightDecay: 0 });
  const order = kernel.arena.place(Int32Array.from({ length: passes.n }, (_, i) => i));
  const loss = kernel.call.lossGradient(order, passes.n);
  const at = moments + 2 * kernel.call.parameterBytes(shape);
  return { loss, gradient: readParameters(kernel, shape, shapeOf(passes.parameters), at) };
}

/** The parameters and the mean squared errors of some training steps, each on all rows. */
export function kernelTraining(
  passes: Passes,
  targets: ArrayLike<number>,
  settings: { readonly steps: number; readonly learningRate: number; readonly weightDecay: number },
): { losses: Float64Array; parameters: Parameters } {
  const placed = place(passes);
  const { kernel, shape, panels } = placed;
  const { call, arena } = kernel;
  const { steps } = settings;
  begin(placed, passes, targets, settings);
  const order = arena.place(Int32Array.from({ length: passes.n * steps }, (_, i) => i % passes.n));
  const sizes = arena.place(new Int32Array(steps).fill(passes.n));
  const losses = arena.reserve(8 * steps);
  call.train(order, sizes, steps, losses);
  return {
    losses: arena.doubles(losses, steps),
    parameters: readParameters(kernel, shape, shapeOf(passes.parameters), panels),
  };
}

function begin(
  { kernel: { call, arena }, shape, x }: Placed,
  { n }: Passes,
  targets: ArrayLike<number>,
  { learningRate, weightDecay }: { readonly learningRate: number; readonly weightDecay: number },
): number {
  const prepared = arena.reserve(call.tableBytes(x, n));
  const moments = arena.reserve(3 * call.parameterBytes(shape));
  call.useConservatism(0, 0, 0, 0, 0, 0, 0);
  call.beginTraining(
    x,
    n,
    arena.place(Float64Array.from(targets)),
    prepared,
    moments,
    learningRate,
    weightDecay,
  );
  return moments;
}

/** Parameters in the kernel's order, as a trained network keeps them. */
export function keptParameters(parameters: Parameters): KernelParameters {
  const kernel = takeKernel();
  const { shape, panels } = arrange(kernel, parameters);
  const count = kernel.call.parameterBytes(shape) / 4;
  return { shape: shapeOf(parameters), panels: kernel.arena.floats(panels, count) };
}
