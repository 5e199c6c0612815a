import { createRequire } from 'node:module';
import type { BackendName } from './backend.js';

/** A backend with its version, for a manifest; does not load it. */
export function describeBackend(name: BackendName): string {
  const require = createRequire(import.meta.url);
  const { version } = require('@tensorflow/tfjs-core/package.json') as { version: string };
  return `tfjs ${version} on ${name}`;
}
