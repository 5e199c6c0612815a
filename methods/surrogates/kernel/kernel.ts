import { Arena } from './arena.js';
import type { KernelExports } from './exports.js';
import { readKernelFile } from './kernel-file.js';

/** The compiled kernel with memory to work in. */
export interface Kernel {
  readonly call: KernelExports;
  readonly arena: Arena;
}

let loaded: Kernel | undefined;
let holder: object | undefined;

/**
 * The thread's one kernel, with all of its memory free: whoever takes it puts in what it needs, calls, copies results
 * out and is done before anyone else takes it. So memory stays at what the largest single use needs.
 *
 * @throws OnebatchError (`bad-input`) when the kernel was not built.
 */
export function takeKernel(): Kernel {
  loaded ??= load();
  loaded.arena.reset();
  holder = undefined;
  return loaded;
}

/** Notes that what the kernel holds now is the owner's, for `heldKernel`; until somebody else takes the kernel. */
export function holdKernel(owner: object): void {
  holder = owner;
}

/** The kernel, if it still holds what the owner put there; otherwise the owner takes it and starts over. */
export function heldKernel(owner: object): Kernel | undefined {
  return holder === owner ? loaded : undefined;
}

function load(): Kernel {
  const instance = new WebAssembly.Instance(new WebAssembly.Module(readKernelFile()));
  const call = instance.exports as unknown as KernelExports;
  return { call, arena: new Arena(call.memory, call.firstAddress()) };
}
