import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type Designs, rowView, zeros } from '../../../../harness/designs.js';
import { encode, makeEncoding } from '../../../../harness/encoding.js';
import { rootStream } from '../../../../harness/random.js';
import { type Column, makeSpace, type Space, sampleUniform } from '../../../../harness/space.js';
import {
  countDesigns,
  isExact,
  maximizeTerms,
} from '../../../../methods/surrogates/ridge/additive-maximum.js';
import {
  makeRidgeFeatures,
  type RidgeFeatures,
} from '../../../../methods/surrogates/ridge/ridge-features.js';

const none: Designs = zeros(0, 3);

function valueAt(features: RidgeFeatures, weights: Float64Array, design: ArrayLike<number>): number {
  const designs = { rows: 1, columns: design.length, values: Float64Array.from(design) };
  const { values } = features.evaluate(encode(features.encoding, designs));
  return values.reduce((sum, term, f) => sum + term * weights[f]!, 0);
}

const discrete: Column[] = [
  { kind: 'category', name: 'k', levels: ['p', 'q', 'r'] },
  { kind: 'integer', name: 'i', low: -3, high: 5 },
  { kind: 'integer', name: 'w', low: 0, high: 1 },
];

function allDesigns(space: Space): number[][] {
  return space.columns.reduce<number[][]>(
    (designs, column) => {
      const values =
        column.kind === 'category'
          ? column.levels.map((_, level) => level)
          : Array.from({ length: column.high - column.low + 1 }, (_, v) => column.low + v);
      return designs.flatMap((design) => values.map((value) => [...design, value]));
    },
    [[]],
  );
}

function normalWeights(features: RidgeFeatures, seed: number): Float64Array {
  const stream = rootStream(seed);
  return Float64Array.from({ length: features.count }, () => stream.normal());
}

const seeds = fc.nat(100_000);
const degrees = fc.constantFrom(1 as const, 2 as const);

describe('maximizeTerms(features, weights, starts)', () => {
  test('is the best of all designs of a discrete space, with pairs and without', () => {
    const space = makeSpace(discrete);
    const all = allDesigns(space);
    expect(all.length).toBe(countDesigns(space));
    fc.assert(
      fc.property(seeds, degrees, fc.boolean(), (seed, degree, pairwise) => {
        const features = makeRidgeFeatures(makeEncoding(space), { degree, pairwise });
        const weights = normalWeights(features, seed);
        const found = valueAt(features, weights, maximizeTerms(features, weights, none));
        expect(found).toBeCloseTo(Math.max(...all.map((design) => valueAt(features, weights, design))), 9);
      }),
      { numRuns: 60 },
    );
  });

  test('is at least as good as every point of a grid over continuous columns, and inside them', () => {
    const space = makeSpace([
      { kind: 'continuous', name: 'a', low: -4, high: -1 },
      { kind: 'continuous', name: 'b', low: 0, high: 100 },
    ]);
    const features = makeRidgeFeatures(makeEncoding(space), { degree: 2, pairwise: false });
    fc.assert(
      fc.property(seeds, (seed) => {
        const weights = normalWeights(features, seed);
        const design = maximizeTerms(features, weights, none);
        const found = valueAt(features, weights, design);
        let best = Number.NEGATIVE_INFINITY;
        for (let i = 0; i <= 40; i++) {
          for (let j = 0; j <= 40; j++) {
            best = Math.max(best, valueAt(features, weights, [-4 + (3 * i) / 40, 2.5 * j]));
          }
        }
        expect(found).toBeGreaterThanOrEqual(best - 1e-9);
        // a grid cell off the vertex costs at most curvature · (cell / 2)² a column
        expect(found - best).toBeLessThan(0.1);
      }),
      { numRuns: 30 },
    );
  });

  test('with pairs and a continuous column ends where no single column can be improved, from the best start', () => {
    const space = makeSpace([...discrete, { kind: 'continuous', name: 'c', low: 0, high: 1 }]);
    const features = makeRidgeFeatures(makeEncoding(space), { degree: 2, pairwise: true });
    expect(isExact(features)).toBe(false);
    const starts = sampleUniform(space, 6, rootStream(1));
    for (let seed = 0; seed < 20; seed++) {
      const weights = normalWeights(features, seed);
      const design = maximizeTerms(features, weights, starts);
      const found = valueAt(features, weights, design);
      for (let i = 0; i < starts.rows; i++) {
        expect(found).toBeGreaterThanOrEqual(valueAt(features, weights, rowView(starts, i)) - 1e-9);
      }
      for (const other of allDesigns(makeSpace(discrete))) {
        const changed = other.filter((value, j) => value !== design[j]).length;
        if (changed > 1) continue;
        expect(found).toBeGreaterThanOrEqual(valueAt(features, weights, [...other, design[3]!]) - 1e-9);
      }
      for (let k = 0; k <= 20; k++) {
        const moved = [design[0]!, design[1]!, design[2]!, k / 20];
        expect(found).toBeGreaterThanOrEqual(valueAt(features, weights, moved) - 1e-9);
      }
    }
  });
});
