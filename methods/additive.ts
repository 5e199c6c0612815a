import { z } from 'zod';
import { type Designs, matrixFromRows, orderByDescending, rowView, stackRows } from '../harness/designs.js';
import { encode } from '../harness/encoding.js';
import { defineMethod, type Offer } from '../harness/method.js';
import { type Stream, sampleWithout } from '../harness/random.js';
import { countValues, type Space, sampleColumn, sampleUniform } from '../harness/space.js';
import { maximizeTerms } from './surrogates/ridge/additive-maximum.js';
import { type FittedRidge, fitRidgeTable, ridgeSurrogate } from './surrogates/ridge.js';
import { bestVisible, makeTable } from './table.js';

/** The designs that an additive regression, and regressions drawn from its posterior, rate highest. */
export const additive = defineMethod({
  name: 'additive',
  description:
    'Additive ridge regression; the batch is its maximizer and those of regressions drawn from its posterior',
  source: 'Hoerl & Kennard 1970; Thompson 1933',
  settings: ridgeSurrogate.settings.extend({
    pairwise: z
      .boolean()
      .default(false)
      .describe(
        'whether products between two columns enter as well (at most 5,000); maximized exactly up to 200,000 designs, beyond that locally',
      ),
    starts: z
      .int()
      .min(0)
      .max(1000)
      .default(10)
      .describe('starts of the local search with pairwise, half of them best visible designs'),
  }),
  propose(offer, settings) {
    const table = makeTable(offer);
    const fitted = fitRidgeTable(table, settings);
    const designs = chooseBatch(offer, fitted, settings.starts, offer.stream.split('additive'));
    const terms = fitted.features.evaluate(encode(table.encoding, designs));
    return {
      designs,
      believed: fitted.fit.mean(terms),
      spread: fitted.fit.variance(terms).map(Math.sqrt),
    };
  },
});

const drawsPerDesign = 5;
const patience = 3;
const inflationStep = 1.5;

/**
 * The fitted regression's maximizer, then those of drawn ones as far as they are new; after three in a row that are
 * not, the draws are spread out by half as much again. What is then still missing is filled up with the best single
 * changes of the batch.
 */
function chooseBatch(offer: Offer, { features, fit }: FittedRidge, starts: number, stream: Stream): Designs {
  const { space, batchSize } = offer;
  const batch = new Map<string, Float64Array>();
  const add = (design: Float64Array): boolean => {
    const key = design.join(',');
    if (batch.has(key)) return false;
    batch.set(key, design);
    return true;
  };
  const from = stackRows([
    bestVisible(offer, Math.min(Math.ceil(starts / 2), offer.designs.rows)),
    sampleUniform(space, Math.floor(starts / 2), stream.split('starts')),
  ]);
  add(maximizeTerms(features, fit.weights, from));
  let inflation = 1;
  let stale = 0;
  for (let k = 0; k < drawsPerDesign * batchSize && batch.size < batchSize; k++) {
    const weights = fit.drawWeights(stream.split('draw', k), inflation);
    stale = add(maximizeTerms(features, weights, from)) ? 0 : stale + 1;
    if (stale >= patience) {
      inflation *= inflationStep;
      stale = 0;
    }
  }
  const mean = (designs: Designs) => fit.mean(features.evaluate(encode(features.encoding, designs)));
  fillUp(batch, add, space, batchSize, mean, stream.split('fill'));
  const rows = [...batch.values()];
  return matrixFromRows(
    Array.from({ length: batchSize }, (_, i) => rows[i % rows.length]!),
    space.columns.length,
  );
}

/** Adds the best single changes of one design of the batch after the other, added ones included, until it is full. */
function fillUp(
  batch: Map<string, Float64Array>,
  add: (design: Float64Array) => boolean,
  space: Space,
  batchSize: number,
  mean: (designs: Designs) => Float64Array,
  stream: Stream,
): void {
  for (const design of batch.values()) {
    const changed = matrixFromRows(singleChanges(space, design, stream));
    for (const i of orderByDescending(mean(changed))) {
      if (batch.size >= batchSize) return;
      add(rowView(changed, i).slice());
    }
  }
}

const mostColumns = 200;
const mostValues = 20;

/**
 * Copies of a design, each with one of at most 200 drawn columns at another value: all values of a small column, drawn
 * ones of a large.
 */
function singleChanges(space: Space, design: Float64Array, stream: Stream): Float64Array[] {
  return sampleWithout(stream, space.columns.length, mostColumns).flatMap((j) => {
    const column = space.columns[j]!;
    const count = countValues(column);
    const low = column.kind === 'category' ? 0 : column.low;
    return Array.from({ length: Math.min(count, mostValues) }, (_, v) => {
      const changed = design.slice();
      changed[j] = count <= mostValues ? low + v : sampleColumn(column, stream);
      return changed;
    });
  });
}
