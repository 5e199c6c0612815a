import { z } from 'zod';
import { takeRows } from '../harness/designs.js';
import { defineMethod } from '../harness/method.js';
import { bestDistinct } from './best-distinct.js';

/** Proposes the best visible designs once more: what nothing new looks like. */
export const repeatBest = defineMethod({
  name: 'repeat-best',
  description: 'the best measured designs once more, each once while there are enough; nothing new',
  source: 'common practice',
  settings: z.strictObject({}),
  propose(offer) {
    const { designs, scores } = bestDistinct(offer, offer.batchSize);
    const rows = Array.from({ length: offer.batchSize }, (_, i) => i % designs.rows);
    return { designs: takeRows(designs, rows), believed: Float64Array.from(rows, (row) => scores[row]!) };
  },
});
