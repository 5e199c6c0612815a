import { z } from 'zod';
import { OnebatchError } from '../../harness/errors.js';
import { type Conservatism, defineCaution } from '../parts.js';
import { meanObjective } from './none.js';

/** Trains the surrogate to predict low where an ascent of it would go. */
export const conservativeTraining = defineCaution({
  name: 'conservative-training',
  description: 'train the model to predict low at designs that an ascent of it finds',
  source: 'conservative objective models, ICML 2021',
  settings: z.strictObject({
    adjust: z.boolean().default(true).describe('adjust the weight to hold over-estimation at the target'),
    weight: z.number().min(0).default(0.1).describe('weight of the penalty; where adjusted, its start'),
    target: z.number().default(2).describe('over-estimation to hold, in standard deviations of the scores'),
    rows: z.int().min(1).default(16).describe('rows of a training step from which designs are mined'),
    steps: z.int().min(1).default(20).describe('ascent steps that mine the designs held down'),
    stepSize: z.number().positive().default(0.03).describe('size of one such step'),
  }),
  async prepare(surrogate, surrogateSettings, table, settings, stream) {
    if (surrogate.fitConservatively === undefined) {
      throw new OnebatchError(
        'method-cannot',
        `caution "conservative-training" trains networks only; surrogate "${surrogate.name}" can't be trained so`,
      );
    }
    const { adjust, target, ...fixed } = settings;
    const conservatism: Conservatism = { ...fixed, ...(adjust ? { target } : {}) };
    return meanObjective(await surrogate.fitConservatively(table, surrogateSettings, conservatism, stream));
  },
});
