import { z } from 'zod';
import { rowKey, rowView, zeros } from '../harness/designs.js';
import { defineMethod } from '../harness/method.js';
import { bestDistinct } from './best-distinct.js';
import { mutateInPlace } from './mutation.js';

/** Draws at a design that is neither in the table nor in the batch, before a repetition is let pass. */
const attempts = 100;

/** Small changes to the best visible designs: what people do by hand. */
export const jitter = defineMethod({
  name: 'jitter',
  description: 'small random changes to the best measured designs, as made by hand; learns nothing',
  source: 'common practice',
  settings: z.strictObject({
    parents: z.int().min(1).default(10).describe('best visible designs that are changed, in turn'),
    step: z
      .number()
      .positive()
      .default(0.05)
      .describe("standard deviation of a numeric change, as a share of the column's range"),
    changes: z
      .number()
      .positive()
      .default(2)
      .describe('columns changed in a design on average; at least one is'),
  }),
  propose({ space, designs, scores, batchSize, stream }, { parents, step, changes }) {
    const chosen = bestDistinct({ designs, scores }, parents).designs;
    const known = new Set(Array.from({ length: designs.rows }, (_, i) => rowKey(designs, i)));
    const batch = zeros(batchSize, space.columns.length);
    for (let i = 0; i < batchSize; i++) {
      const row = rowView(batch, i);
      for (let attempt = 0; attempt < attempts; attempt++) {
        row.set(rowView(chosen, i % chosen.rows));
        mutateInPlace(row, space, { changes, step, atLeastOne: true }, stream);
        if (!known.has(rowKey(batch, i))) break;
      }
      known.add(rowKey(batch, i));
    }
    return { designs: batch };
  },
});
