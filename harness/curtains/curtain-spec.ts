import { z } from 'zod';

const where = z
  .record(z.string(), z.array(z.union([z.string(), z.number()])).min(1))
  .refine((box) => Object.keys(box).length > 0, { error: 'names no column' })
  .describe(
    'for each named column the interval [low, high], bounds included, or a list of levels; rows inside on all are hidden',
  );

const drawnRegion = z.strictObject({
  columns: z.int().min(1).default(2).describe('on how many columns the hidden box is drawn'),
  share: z
    .number()
    .gt(0)
    .lt(1)
    .default(0.4)
    .describe('share of the range of each such column, or of its levels, that the box covers'),
  around: z
    .enum(['random', 'optimum'])
    .default('random')
    .describe('whether the box lies anywhere, or holds the coordinates of the optimum'),
});

const region = z.union([z.strictObject({ where }), drawnRegion], {
  error:
    'expected { where: { column: [low, high] or levels } }, or any of columns (a whole number), share (between 0 and 1) and around (random or optimum)',
});

const family = z.strictObject({
  parents: z.int().min(1).default(3).describe('of how many designs variants are made'),
  changes: z
    .int()
    .min(1)
    .default(2)
    .describe('in how many columns at most a variant differs from its parent'),
});

/** What of a pool is visible, and how noisy; parts combine, and an empty object hides nothing. */
export const curtainSchema = z.strictObject({
  ceiling: z
    .number()
    .gt(0)
    .lt(1)
    .optional()
    .describe('only rows whose true score is below this quantile (type 7) of the pool are visible'),
  region: region.optional().describe('rows inside a box are hidden; the box is written out, or drawn'),
  family: family
    .optional()
    .describe(
      'half of the pool is made of variants of a few parents, and only rows within a few changes of a parent are visible',
    ),
  thin: z
    .int()
    .min(2)
    .optional()
    .describe('this many of the rows left are visible, drawn at random; all when fewer are left'),
  noise: z
    .number()
    .min(0)
    .optional()
    .describe(
      'standard deviation of Gaussian measurement noise, as a share of that of the true scores of the pool',
    ),
});

export type CurtainSpec = z.output<typeof curtainSchema>;
export type RegionSpec = z.output<typeof region>;
export type DrawnRegionSpec = z.output<typeof drawnRegion>;
export type WhereSpec = z.output<typeof where>;
export type FamilySpec = z.output<typeof family>;
