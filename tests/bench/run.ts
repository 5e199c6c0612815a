import { cpus } from 'node:os';
import { benchBackends } from './backends.js';
import { benchCells } from './cells.js';
import { benchCompare } from './compare.js';
import { benchGaussianProcess } from './gaussian-process.js';
import { benchNetworks } from './networks.js';

process.stdout.write(
  `${cpus()[0]?.model ?? 'unknown processor'}, ${cpus().length} cores, Node ${process.version}\n`,
);
process.stdout.write('medians of 5 runs; ratios within this run\n\n');
await benchNetworks();
await benchGaussianProcess();
await benchBackends();
await benchCells();
await benchCompare();
