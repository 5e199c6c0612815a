import { createRequire } from 'node:module';
import { dirname, join, sep } from 'node:path';
import { setThreadsCount, setWasmPaths } from '@tensorflow/tfjs-backend-wasm';
import * as tf from '@tensorflow/tfjs-core';
import { OnebatchError } from '../../../harness/errors.js';

/** What does a network's arithmetic: the portable wasm backend, or the native one where a user has installed it. */
export type BackendName = 'wasm' | 'tfjs-node';

export const backendNames: readonly BackendName[] = ['wasm', 'tfjs-node'];

const nativePackage = '@tensorflow/tfjs-node';

let wanted: BackendName = 'wasm';
let started: BackendName | undefined;

/**
 * Chooses the backend for the networks of this thread, before the first one is trained.
 *
 * @throws OnebatchError (`bad-input`) when the native backend is asked for and its package is not installed.
 */
export async function useBackend(name: BackendName): Promise<void> {
  wanted = name;
  await startBackend();
}

/** Starts the chosen backend once; called before any network arithmetic. One thread, so that sums keep their order. */
export async function startBackend(): Promise<void> {
  if (started === wanted) return;
  if (wanted === 'wasm') await startWasm();
  else await startNative();
  started = wanted;
}

async function startWasm(): Promise<void> {
  const require = createRequire(import.meta.url);
  const folder = join(dirname(require.resolve('@tensorflow/tfjs-backend-wasm/package.json')), 'wasm-out');
  setThreadsCount(1);
  setWasmPaths(folder + sep);
  await tf.setBackend('wasm');
  await tf.ready();
}

async function startNative(): Promise<void> {
  try {
    await import(nativePackage);
  } catch (cause) {
    throw new OnebatchError(
      'bad-input',
      `backend "tfjs-node" needs the package ${nativePackage}, which is not installed; install it or use "wasm"`,
      { cause },
    );
  }
  await tf.setBackend('tensorflow');
  await tf.ready();
}
