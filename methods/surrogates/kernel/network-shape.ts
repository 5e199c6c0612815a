import type { Encoding } from '../../../harness/encoding.js';
import { leak } from '../network/leak.js';
import { makeScaling } from '../network/scaling.js';
import type { Kernel } from './kernel.js';

/** Inputs and hidden widths of a network. */
export interface NetworkShape {
  readonly inputs: number;
  readonly hidden: readonly number[];
}

/** The most rows that go through a network together: as many as stay near the processor. */
const rowsAtOnce = 128;

/** Tells the kernel which space rows come from, and how its features become inputs. */
export function useEncoding({ call, arena }: Kernel, encoding: Encoding): void {
  const { shifts, factors } = makeScaling(encoding);
  const blocks = encoding.blocks.flatMap(({ column, offset, width }) => [
    column.kind === 'category' ? 1 : 0,
    offset,
    width,
  ]);
  call.useSpace(
    encoding.width,
    arena.place(Int32Array.from(blocks)),
    encoding.blocks.length,
    arena.place(shifts),
    arena.place(factors),
  );
}

/** Puts a shape in the kernel's memory and returns its address. */
export function placeShape({ arena }: Kernel, { inputs, hidden }: NetworkShape): number {
  return arena.place(Int32Array.of(hidden.length, inputs, ...hidden));
}

/** Tells the kernel which networks to use, with scratch memory for passes of up to `rows` rows at once. */
export function useNetworks(
  { call, arena }: Kernel,
  shape: number,
  parameters: number,
  { members = 1, rows = rowsAtOnce, slope = leak },
): void {
  const scratch = arena.reserve(call.scratchBytes(shape, members, rows));
  call.useNetworks(shape, parameters, members, slope, rows, scratch);
}
