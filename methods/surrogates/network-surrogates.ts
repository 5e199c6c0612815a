import { z } from 'zod';
import type { Stream } from '../../harness/random.js';
import { defineSurrogate } from '../parts.js';
import { modelOfNetwork } from './network/ensemble.js';
import { networkSettings } from './network/network-settings.js';
import { trainEnsemble, trainNetwork } from './network/training.js';

/** One multilayer perceptron. */
export const networkSurrogate = defineSurrogate({
  name: 'network',
  description: 'one multilayer perceptron, leaky rectified units, trained by squared error',
  source: 'Rumelhart et al. 1986; Adam: Kingma & Ba 2015',
  settings: networkSettings,
  async fit(table, settings, stream) {
    return modelOfNetwork(await trainNetwork(table, settings, stream));
  },
  async fitConservatively(table, settings, conservatism, stream) {
    return modelOfNetwork(await trainNetwork(table, settings, stream, conservatism));
  },
});

/** Several perceptrons that differ in their first parameters and the order of rows. */
export const networkEnsembleSurrogate = defineSurrogate({
  name: 'network-ensemble',
  description: 'several such networks from different random starts; their disagreement is the spread',
  source: 'Lakshminarayanan et al. 2017',
  settings: networkSettings.extend({
    members: z.int().min(2).max(50).default(5).describe('networks in the ensemble'),
  }),
  async fit(table, settings, stream) {
    return trainEnsemble(table, settings, memberStreams(settings.members, stream));
  },
  async fitConservatively(table, settings, conservatism, stream) {
    return trainEnsemble(table, settings, memberStreams(settings.members, stream), conservatism);
  },
});

function memberStreams(members: number, stream: Stream): Stream[] {
  return Array.from({ length: members }, (_, member) => stream.split('member', member));
}
