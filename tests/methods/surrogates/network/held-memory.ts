import * as tf from '@tensorflow/tfjs-core';
import { takeKernel } from '../../../../methods/surrogates/kernel/kernel.js';
import type { BackendName } from '../../../../methods/surrogates/network/backend.js';

/** The backends that every machine has. */
export const everywhere = ['kernel', 'wasm'] as const satisfies readonly BackendName[];

/** What a started backend holds: the size of the kernel's memory, or tfjs's tensors and their bytes. */
export function heldMemory(backend: (typeof everywhere)[number]): Record<string, number> {
  if (backend === 'kernel') return { bytes: takeKernel().call.memory.buffer.byteLength };
  const { numTensors, numBytes } = tf.memory();
  return { numTensors, numBytes };
}
