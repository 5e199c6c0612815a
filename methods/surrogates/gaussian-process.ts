import { z } from 'zod';
import type { Matrix } from '../../harness/designs.js';
import { defineSurrogate, type Model } from '../parts.js';
import { type FittedProcess, fitProcess } from './gaussian-process/fitted-process.js';
import { lazyPrediction } from './lazy-prediction.js';

/** Exact Gaussian process regression on encoded rows. */
export const gaussianProcessSurrogate = defineSurrogate({
  name: 'gaussian-process',
  description:
    'Gaussian process, Matérn-5/2 kernel with one length scale a column, hyper-parameters by maximum a posteriori',
  source: 'Rasmussen & Williams 2006, algorithm 2.1 and eqs. 5.8, 5.9',
  settings: z.strictObject({
    starts: z.int().min(1).max(100).default(3).describe('starts of the hyper-parameter search'),
    iterations: z.int().min(1).max(1000).default(30).describe('most quasi-Newton steps from each start'),
    fitRows: z
      .int()
      .min(2)
      .max(2000)
      .default(300)
      .describe('rows drawn from the table to fit hyper-parameters on; all rows of a smaller table'),
    mostRows: z
      .int()
      .min(2)
      .max(5000)
      .default(1000)
      .describe('rows to predict from: of a larger table, its best rows make up half and the rest are drawn'),
    sharedAbove: z
      .int()
      .min(1)
      .max(200)
      .default(50)
      .describe('with more columns than this, all columns share one length scale'),
  }),
  fit: (table, settings, stream) => makeProcessModel(fitProcess(table, settings, stream)),
});

/**
 * The process as a model in score units; the spread is that of the latent function, without measurement noise. It is
 * worked out when it is first read, since it costs n²/2 multiplications a row where a mean costs n · d.
 */
export function makeProcessModel({ scale, makePosterior }: FittedProcess): Model {
  const posterior = makePosterior();
  return {
    predict(x: Matrix) {
      const mean = posterior.mean(x).map((value) => scale.mean + scale.deviation * value);
      return lazyPrediction(mean, x, (asked) =>
        posterior.variance(asked).map((value) => scale.deviation * Math.sqrt(value)),
      );
    },
    gradient(x: Matrix, spreadWeight: number) {
      const { rows, columns, values } = posterior.gradient(x, spreadWeight);
      return { rows, columns, values: values.map((value) => scale.deviation * value) };
    },
  };
}
