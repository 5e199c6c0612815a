import { createRequire } from 'node:module';
import { dirname, join, sep } from 'node:path';
import { OnebatchError } from '../../../harness/errors.js';
import { takeKernel } from '../kernel/kernel.js';

/**
 * What does a network's arithmetic: the program's own kernel, or tfjs on its portable wasm backend or on the native
 * one where a user has installed it.
 */
export type BackendName = 'kernel' | 'wasm' | 'tfjs-node';

export const backendNames: readonly BackendName[] = ['kernel', 'wasm', 'tfjs-node'];

const nativePackage = '@tensorflow/tfjs-node';

let wanted: BackendName = 'kernel';
let started: BackendName | undefined;

/**
 * Chooses the backend for the networks of this thread, before the first one is trained.
 *
 * @throws OnebatchError (`bad-input`) when the native backend is asked for and its package is not installed, or the
 * kernel and it is not built.
 */
export async function useBackend(name: BackendName): Promise<void> {
  wanted = name;
  await startBackend();
}

/**
 * Starts the chosen backend once and says which it is; called before any network arithmetic. tfjs is loaded only where
 * it is chosen, and runs on one thread, so that sums keep their order.
 */
export async function startBackend(): Promise<BackendName> {
  if (started === wanted) return started;
  if (wanted === 'kernel') takeKernel();
  else if (wanted === 'wasm') await startWasm();
  else await startNative();
  started = wanted;
  return started;
}

async function startWasm(): Promise<void> {
  const { setThreadsCount, setWasmPaths } = await import('@tensorflow/tfjs-backend-wasm');
  const tf = await import('@tensorflow/tfjs-core');
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
      `backend "tfjs-node" needs the package ${nativePackage}, which is not installed; install it or use "kernel"`,
      { cause },
    );
  }
  const tf = await import('@tensorflow/tfjs-core');
  await tf.setBackend('tensorflow');
  await tf.ready();
}
