import fc from 'fast-check';
import type { Designs } from '../../harness/designs.js';
import { rootStream } from '../../harness/random.js';
import { type Column, makeSpace, type Space, sampleUniform } from '../../harness/space.js';

type Bare<C> = C extends Column ? Omit<C, 'name'> : never;

const continuous = fc
  .record({
    low: fc.double({ min: -1e6, max: 1e6, noNaN: true }),
    width: fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
  })
  .map(({ low, width }) => ({ kind: 'continuous' as const, low, high: low + width }));

const integer = fc
  .record({
    low: fc.integer({ min: -1000, max: 1000 }),
    width: fc.oneof(fc.integer({ min: 1, max: 9 }), fc.integer({ min: 1, max: 1e9 })),
  })
  .map(({ low, width }) => ({ kind: 'integer' as const, low, high: low + width }));

const category = fc.integer({ min: 2, max: 6 }).map((count) => ({
  kind: 'category' as const,
  levels: Array.from({ length: count }, (_, i) => `level ${i}`),
}));

/** Spaces of 1 to 6 columns of all kinds. */
export function arbitrarySpace(): fc.Arbitrary<Space> {
  return fc
    .array(fc.oneof<fc.Arbitrary<Bare<Column>>[]>(continuous, integer, category), {
      minLength: 1,
      maxLength: 6,
    })
    .map((columns) => makeSpace(columns.map((column, i) => ({ ...column, name: `c${i}` }) as Column)));
}

/** A space with designs drawn uniformly from it. */
export function arbitraryDesigns(rows: number): fc.Arbitrary<{ space: Space; designs: Designs }> {
  return fc
    .record({ space: arbitrarySpace(), seed: fc.nat() })
    .map(({ space, seed }) => ({ space, designs: sampleUniform(space, rows, rootStream(seed)) }));
}

/** How fast-check runs: a fixed seed, so that a failure comes again. */
export const runs = { seed: 20260, numRuns: 100 } as const;
