import type { Matrix } from '../../../../harness/designs.js';
import type { Encoding } from '../../../../harness/encoding.js';
import { takeKernel } from '../../../../methods/surrogates/kernel/kernel.js';
import type { KernelParameters } from '../../../../methods/surrogates/kernel/kernel-parameters.js';
import { placeShape, useEncoding, useNetworks } from '../../../../methods/surrogates/kernel/network-shape.js';

interface Climb {
  readonly steps: number;
  readonly stepSize: number;
  readonly spreadWeight: number;
  readonly traceEvery: number;
}

/** Where an ascent in the kernel takes encoded rows, and its records on the way. */
export function kernelAscent(
  encoding: Encoding,
  members: readonly KernelParameters[],
  x: Matrix,
  { steps, stepSize, spreadWeight, traceEvery }: Climb,
): { x: Matrix; trace: Matrix[] } {
  const kernel = takeKernel();
  const { call, arena } = kernel;
  useEncoding(kernel, encoding);
  const shape = placeShape(kernel, members[0]!.shape);
  const parameters = arena.place(Float32Array.from(members.flatMap(({ panels }) => [...panels])));
  useNetworks(kernel, shape, parameters, { members: members.length });
  const size = x.values.length;
  const records = traceEvery === 0 ? 0 : Math.ceil(steps / traceEvery);
  const rows = arena.place(x.values);
  const trace = arena.reserve(8 * size * records);
  const gradient = arena.reserve(8 * size);
  const rate = stepSize * Math.sqrt(encoding.width);
  call.transposeMembers(1);
  call.ascend(rows, x.rows, steps, rate, spreadWeight, gradient, trace, traceEvery);
  const read = (at: number): Matrix => ({ ...x, values: arena.doubles(at, size) });
  return { x: read(rows), trace: Array.from({ length: records }, (_, k) => read(trace + 8 * size * k)) };
}
