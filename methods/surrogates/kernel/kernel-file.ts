import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { OnebatchError } from '../../../harness/errors.js';

/** Beside the compiled form of this file, and where `npm run build` puts it when the sources themselves are run. */
const folder = dirname(fileURLToPath(import.meta.url));
const places = [
  join(folder, 'kernel.wasm'),
  join(folder, '../../../dist/methods/surrogates/kernel/kernel.wasm'),
];

/**
 * The compiled kernel's bytes.
 *
 * @throws OnebatchError (`bad-input`) when it was not built.
 */
export function readKernelFile(): Uint8Array<ArrayBuffer> {
  const place = places.find((path) => existsSync(path));
  if (place === undefined) {
    throw new OnebatchError(
      'bad-input',
      'backend "kernel" needs the file kernel.wasm, which is not built; run "npm run build", or use backend "wasm"',
    );
  }
  return new Uint8Array(readFileSync(place));
}
