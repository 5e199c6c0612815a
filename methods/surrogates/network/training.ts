import type { Stream } from '../../../harness/random.js';
import type { Conservatism, Model, Table } from '../../parts.js';
import { trainEnsembleOnKernel, trainOnKernel } from '../kernel/train-on-kernel.js';
import { startBackend } from './backend.js';
import { modelOfEnsemble } from './ensemble.js';
import type { NetworkSettings } from './network-settings.js';
import type { Network } from './trained-network.js';

/**
 * Trains one network on the table: squared error on standardized scores, Adam, rows in seeded random order.
 *
 * With `conservatism` it minimizes the conservative training objective (conservative objective models, ICML 2021):
 * squared error + weight · (mean prediction at designs mined by ascent from the step's rows − mean prediction at the
 * rows themselves). With a target the weight follows dual ascent: it grows while the over-estimation of mined designs
 * is above the target and falls towards 0 below it.
 */
export async function trainNetwork(
  table: Table,
  settings: NetworkSettings,
  stream: Stream,
  conservatism?: Conservatism,
): Promise<Network> {
  const backend = await startBackend();
  if (backend === 'kernel') return trainOnKernel(table, settings, stream, conservatism);
  const { trainOnTfjs } = await import('./tfjs-training.js');
  return trainOnTfjs(table, settings, stream, conservatism);
}

/** Trains one network for each stream, as `trainNetwork` does, and makes one model of them. */
export async function trainEnsemble(
  table: Table,
  settings: NetworkSettings,
  streams: readonly Stream[],
  conservatism?: Conservatism,
): Promise<Model> {
  const backend = await startBackend();
  if (backend === 'kernel') return trainEnsembleOnKernel(table, settings, streams, conservatism);
  const networks = [];
  for (const stream of streams) networks.push(await trainNetwork(table, settings, stream, conservatism));
  return modelOfEnsemble(networks);
}
