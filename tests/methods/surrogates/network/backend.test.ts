import { createRequire } from 'node:module';
import * as tf from '@tensorflow/tfjs-core';
import { afterEach, describe, expect, test } from 'vitest';
import { OnebatchError } from '../../../../harness/errors.js';
import { startBackend, useBackend } from '../../../../methods/surrogates/network/backend.js';
import { describeBackend } from '../../../../methods/surrogates/network/backend-description.js';

const nativePackage = '@tensorflow/tfjs-node';
const installed = canResolve(nativePackage);

afterEach(() => useBackend('kernel'));

describe('startBackend()', () => {
  test('starts the kernel where nothing else was chosen, without tfjs', async () => {
    expect(await startBackend()).toBe('kernel');
    expect(tf.findBackend('wasm')).toBeNull();
  });

  test('starts wasm where it was chosen, on one thread so that sums keep their order', async () => {
    await useBackend('wasm');
    expect(await startBackend()).toBe('wasm');
    expect(tf.getBackend()).toBe('wasm');
    const { getThreadsCount } = await import('@tensorflow/tfjs-backend-wasm');
    expect(getThreadsCount()).toBe(1);
  });
});

describe.skipIf(installed)(`useBackend("tfjs-node") where ${nativePackage} is not installed`, () => {
  test('is refused with the package’s name, and not replaced behind the user’s back', async () => {
    for (const attempt of [() => useBackend('tfjs-node'), startBackend]) {
      const failure = await attempt().catch((error: unknown) => error);
      expect(failure).toBeInstanceOf(OnebatchError);
      expect(failure).toMatchObject({
        code: 'bad-input',
        message: expect.stringContaining('@tensorflow/tfjs-node'),
      });
    }
  });
});

test('describeBackend(name) says tfjs’s version and the backend', () => {
  expect(describeBackend('wasm')).toBe(`tfjs ${tf.version_core} on wasm`);
});

test('describeBackend("kernel") names the code that runs', () => {
  expect(describeBackend('kernel')).toMatch(/^kernel [0-9a-f]{12}$/);
});

function canResolve(name: string): boolean {
  try {
    createRequire(import.meta.url).resolve(name);
    return true;
  } catch {
    return false;
  }
}
