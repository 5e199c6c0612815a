import { z } from 'zod';
import { encode } from '../harness/encoding.js';
import { defineMethod } from '../harness/method.js';
import { thompsonBatch, upperBoundBatch } from './surrogates/gaussian-process/batches.js';
import { makeCandidates } from './surrogates/gaussian-process/candidates.js';
import { fitProcess } from './surrogates/gaussian-process/fitted-process.js';
import { gaussianProcessSurrogate } from './surrogates/gaussian-process.js';
import { makeTable } from './table.js';

/** A batch from a Gaussian process: Thompson samples, or upper confidence bounds with believed designs. */
export const gaussianProcess = defineMethod({
  name: 'gaussian-process',
  description: 'Gaussian process; the batch maximizes functions drawn from it, or its upper confidence bound',
  source:
    'Rasmussen & Williams 2006; Thompson 1933 with Wilson et al. 2020; Srinivas et al. 2010 with Ginsbourger et al. 2010',
  settings: gaussianProcessSurrogate.settings.extend({
    batch: z
      .enum(['thompson', 'upper-bound'])
      .default('thompson')
      .describe('how the batch is chosen: maximizers of drawn functions, or upper confidence bounds in turn'),
    kappa: z
      .number()
      .min(0)
      .max(100)
      .default(2)
      .describe('spreads above the mean at which the upper confidence bound lies'),
    candidates: z
      .int()
      .min(10)
      .max(20_000)
      .default(1000)
      .describe('designs among which maximizers are first sought'),
    frequencies: z
      .int()
      .min(1)
      .max(5000)
      .default(512)
      .describe(
        'random frequencies that drawn functions are made of; fewer where they would hold over 1,000,000 numbers',
      ),
    rounds: z.int().min(0).max(1000).default(20).describe('most rounds of local improvement of a design'),
    steps: z
      .int()
      .min(1)
      .max(1000)
      .default(20)
      .describe('most quasi-Newton steps over continuous columns in a round'),
    tries: z
      .int()
      .min(1)
      .max(10_000)
      .default(100)
      .describe('most changes of one integer or category column tried in a round'),
  }),
  propose(offer, settings) {
    const { batchSize } = offer;
    const stream = offer.stream.split('gaussian-process');
    const table = makeTable(offer);
    const { scale, makePosterior } = fitProcess(table, settings, stream.split('fit'));
    const posterior = makePosterior();
    const candidates = makeCandidates(
      table,
      posterior,
      settings.candidates,
      settings,
      stream.split('candidates'),
    );
    const choose = stream.split('batch');
    const designs =
      settings.batch === 'thompson'
        ? thompsonBatch(
            posterior,
            table.encoding,
            candidates,
            batchSize,
            settings.frequencies,
            settings,
            choose,
          )
        : upperBoundBatch(
            makePosterior(batchSize),
            table.encoding,
            candidates,
            batchSize,
            settings.kappa,
            settings,
            choose,
          );
    const x = encode(table.encoding, designs);
    return {
      designs,
      believed: posterior.mean(x).map((value) => scale.mean + scale.deviation * value),
      spread: posterior.variance(x).map((value) => scale.deviation * Math.sqrt(value)),
    };
  },
});
