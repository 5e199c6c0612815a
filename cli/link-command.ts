import { chmod, rm, symlink } from 'node:fs/promises';
import { join } from 'node:path';
import { packageRoot } from './package-root.js';

// Run by `npm ci` in a clone: npm links the commands of dependencies but not a package's own, so `npx onebatch` would
// first install the clone into npm's cache. Windows has no such links; there npx takes that longer way.
const command = join(packageRoot, 'node_modules', '.bin', 'onebatch');
const target = join(packageRoot, 'dist', 'cli', 'main.js');

if (process.platform !== 'win32') {
  await chmod(target, 0o755);
  await rm(command, { force: true });
  await symlink(target, command).catch(ignoreMissingFolder);
}

/** A package unpacked without its own dependencies has no folder for commands, and needs none. */
function ignoreMissingFolder(error: NodeJS.ErrnoException): void {
  if (error.code !== 'ENOENT') throw error;
}
