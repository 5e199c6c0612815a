import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of this package, found upwards from this file, wherever the build put it. */
export const packageRoot: string = findRoot(dirname(fileURLToPath(import.meta.url)));

/** This program's version. */
export const version: string = (
  JSON.parse(readFileSync(join(packageRoot, 'package.json'), 'utf8')) as { version: string }
).version;

function findRoot(folder: string): string {
  return existsSync(join(folder, 'package.json')) ? folder : findRoot(dirname(folder));
}
