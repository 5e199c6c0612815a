import { z } from 'zod';
import { type Matrix, rowView, zeros } from '../../harness/designs.js';
import { defineSurrogate, type Model, type Table } from '../parts.js';
import { lazyPrediction } from './lazy-prediction.js';
import { choosePenalty } from './ridge/choose-penalty.js';
import { makeRidgeFeatures, type RidgeFeatures, type RidgeTerms } from './ridge/ridge-features.js';
import { fitRidge, type RidgeFit } from './ridge/ridge-fit.js';
import { makeRidgeSystem } from './ridge/ridge-system.js';

/** Ridge regression on the terms of single columns, and of pairs of columns where asked for. */
export const ridgeSurrogate = defineSurrogate({
  name: 'ridge',
  description:
    'Ridge regression: each column on its own, linear and squared or a weight a level; pairs on demand',
  source: 'Hoerl & Kennard 1970',
  settings: z.strictObject({
    degree: z
      .union([z.literal(1), z.literal(2)])
      .default(2)
      .describe('1: continuous and integer columns enter linearly; 2: also squared'),
    pairwise: z
      .boolean()
      .default(false)
      .describe('whether products between two columns enter as well; at most 5,000 of them'),
    penalty: z
      .union([z.literal('auto'), z.number().min(1e-9).max(1e12)])
      .default('auto')
      .describe('weight of the squared weights, or "auto": chosen by leave-one-out error'),
  }),
  fit: (table, settings) => makeRidgeModel(fitRidgeTable(table, settings)),
});

/** A ridge regression with the terms it stands on. */
export interface FittedRidge {
  readonly features: RidgeFeatures;
  readonly fit: RidgeFit;
}

/**
 * Fits a table's scores.
 *
 * @throws OnebatchError (`method-cannot`) when `pairwise` asks for more than 5,000 products.
 */
export function fitRidgeTable(
  table: Table,
  settings: RidgeTerms & { penalty: number | 'auto' },
): FittedRidge {
  const features = makeRidgeFeatures(table.encoding, settings);
  const system = makeRidgeSystem(features.evaluate(table.x), table.scores);
  const penalty = settings.penalty === 'auto' ? choosePenalty(system) : settings.penalty;
  return { features, fit: fitRidge(system, penalty) };
}

/** The regression as a model of encoded rows; the spread is that of the fit, without measurement noise. */
export function makeRidgeModel({ features, fit }: FittedRidge): Model {
  return {
    predict: (x) =>
      lazyPrediction(fit.mean(features.evaluate(x)), x, (asked) =>
        fit.variance(features.evaluate(asked)).map(Math.sqrt),
      ),
    gradient(x: Matrix, spreadWeight: number) {
      const gradient = zeros(x.rows, x.columns);
      const terms = features.evaluate(x);
      const variances = spreadWeight === 0 ? undefined : fit.variance(terms);
      for (let i = 0; i < x.rows; i++) {
        let coefficients = fit.weights;
        const spread = Math.sqrt(variances?.[i] ?? 0);
        if (spread > 0) {
          const ofVariance = fit.halfVarianceGradient(rowView(terms, i));
          coefficients = coefficients.map((weight, f) => weight - (spreadWeight * ofVariance[f]!) / spread);
        }
        rowView(gradient, i).set(features.gradient(rowView(x, i), coefficients));
      }
      return gradient;
    },
  };
}
