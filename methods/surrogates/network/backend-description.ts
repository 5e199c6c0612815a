import { createHash } from 'node:crypto';
import { createRequire } from 'node:module';
import { readKernelFile } from '../kernel/kernel-file.js';
import type { BackendName } from './backend.js';

/** A backend with its version, for a manifest; does not load it. The kernel's version is the hash of its code. */
export function describeBackend(name: BackendName): string {
  if (name === 'kernel') {
    return `kernel ${createHash('sha256').update(readKernelFile()).digest('hex').slice(0, 12)}`;
  }
  const require = createRequire(import.meta.url);
  const { version } = require('@tensorflow/tfjs-core/package.json') as { version: string };
  return `tfjs ${version} on ${name}`;
}
