import { z } from 'zod';
import type { Stream } from '../harness/random.js';
import { type ContinuousColumn, type IntegerColumn, makeSpace } from '../harness/space.js';
import { defineTaskFamily } from '../harness/task.js';
import { categoryColumn, continuousColumn, integerColumn } from './recipe/columns.js';
import { drawYield, largestLoss, lossOf } from './recipe/loss.js';
import { scoreRows } from './score-rows.js';

/** Yield of the best recipe, in points. */
const fullYield = 100;

/**
 * A growing recipe with dials, counts and choices. All numbers are invented; only the shape is that of real recipes:
 * each dial has an ideal, off-centre, with a steeper side and a plateau of failure far away; some dials must move
 * together; every cultivar, substrate … but the best wants another recipe, nearer to the middle, and forgives more.
 *
 * Yield = 100 · (1 − loss / bound of the loss), in points, 0 … 100. The best recipe is drawn first, and the loss is
 * built around it so that it is 0 there and positive elsewhere (the argument stands at `lossOf`), so the optimum of
 * 100 points is exact by construction.
 */
export const recipe = defineTaskFamily({
  name: 'recipe',
  description:
    'growing recipe of dials, counts and choices with a built-in best recipe; all numbers are invented',
  source: 'own construction',
  settings: z.strictObject({
    continuous: z.int().min(1).max(50).default(4).describe('continuous columns'),
    integers: z.int().min(0).max(50).default(2).describe('whole-number columns'),
    categories: z.int().min(0).max(50).default(2).describe('category columns'),
    levels: z.int().min(2).max(20).default(4).describe('levels of every category column'),
    interaction: z
      .number()
      .min(0)
      .max(1)
      .default(0.5)
      .describe('how strongly columns depend on each other; with 0 the yield is a sum over columns'),
    ruggedness: z
      .number()
      .min(0)
      .max(1)
      .default(0.1)
      .describe('height of ripples along the numeric columns, as a share of each column’s weight'),
  }),
  make({ continuous, integers, categories, levels, interaction, ruggedness }, stream) {
    const numeric = [
      ...Array.from({ length: continuous }, (_, j) => continuousColumn(j)),
      ...Array.from({ length: integers }, (_, j) => integerColumn(j)),
    ];
    const space = makeSpace([
      ...numeric,
      ...Array.from({ length: categories }, (_, j) => categoryColumn(j, levels)),
    ]);
    const best = stream.split('best');
    const bestValues = numeric.map((column) => drawBest(column, best));
    const bestLevels = Float64Array.from({ length: categories }, () => best.below(levels));
    const sharesOf = (values: ArrayLike<number>): Float64Array =>
      Float64Array.from(numeric, ({ low, high }, j) => (values[j]! - low) / (high - low));

    const ideal = sharesOf(bestValues);
    const yielded = drawYield({ ideal, bestLevels, levels, interaction, ruggedness }, stream.split('yield'));
    const bound = largestLoss(yielded);
    return {
      space,
      truth: (designs) =>
        scoreRows(designs, (row) => {
          const loss = lossOf(yielded, sharesOf(row), row.subarray(numeric.length));
          return fullYield * (1 - loss / bound);
        }),
      optimum: { value: fullYield, design: Float64Array.of(...bestValues, ...bestLevels), known: 'exact' },
    };
  },
});

/** A value between 12 % and 38 %, or between 62 % and 88 %, of the column's range: neither central nor at an end. */
function drawBest(column: ContinuousColumn | IntegerColumn, stream: Stream): number {
  const inLowerHalf = stream.below(2) === 0;
  const share = (inLowerHalf ? 0.12 : 0.62) + 0.26 * stream.uniform();
  const value = column.low + share * (column.high - column.low);
  return column.kind === 'integer' ? Math.round(value) : value;
}
