import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type Matrix, matrixFromRows, takeRows, zeros } from '../../../../harness/designs.js';
import { rootStream } from '../../../../harness/random.js';
import { choosePenalty, leaveOneOutResiduals } from '../../../../methods/surrogates/ridge/choose-penalty.js';
import { fitRidge } from '../../../../methods/surrogates/ridge/ridge-fit.js';
import { makeRidgeSystem } from '../../../../methods/surrogates/ridge/ridge-system.js';

interface RidgeReference {
  readonly X: number[][];
  readonly y: number[];
  readonly fits: {
    alpha: number;
    with_intercept: { coef: number[]; intercept: number; 'predict_at_2.5_2.0': number };
    no_intercept: { coef: number[]; 'predict_at_2.5_2.0': number };
  }[];
}

/** Computed with scikit-learn 1.2.1; see the file's `source` fields. */
const reference = (
  JSON.parse(readFileSync(new URL('../../../reference/models.json', import.meta.url), 'utf8')) as {
    ridge: RidgeReference;
  }
).ridge;

function normalTerms(n: number, p: number, seed: number): { terms: Matrix; targets: Float64Array } {
  const stream = rootStream(seed);
  const terms = zeros(n, p);
  for (let k = 0; k < terms.values.length; k++) terms.values[k] = stream.normal();
  return { terms, targets: Float64Array.from({ length: n }, () => 3 + stream.normal()) };
}

function expectClose(actual: ArrayLike<number>, wanted: ArrayLike<number>, digits: number): void {
  expect(actual.length).toBe(wanted.length);
  for (let i = 0; i < wanted.length; i++) expect(actual[i]).toBeCloseTo(wanted[i]!, digits);
}

describe('fitRidge(makeRidgeSystem(terms, targets), penalty)', () => {
  const terms = matrixFromRows(reference.X);
  const targets = Float64Array.from(reference.y);
  const asked = matrixFromRows([[2.5, 2]]);

  test.each(reference.fits)('agrees with scikit-learn to 1e-10 at penalty $alpha, in both forms', (row) => {
    for (const form of row.alpha > 0 ? (['primal', 'dual'] as const) : (['primal'] as const)) {
      const fit = fitRidge(makeRidgeSystem(terms, targets, { form }), row.alpha);
      expectClose(fit.weights, row.with_intercept.coef, 10);
      expect(fit.intercept).toBeCloseTo(row.with_intercept.intercept, 10);
      expectClose(fit.mean(asked), [row.with_intercept['predict_at_2.5_2.0']], 10);
      const bare = fitRidge(makeRidgeSystem(terms, targets, { form, intercept: false }), row.alpha);
      expectClose(bare.weights, row.no_intercept.coef, 10);
      expectClose(bare.mean(asked), [row.no_intercept['predict_at_2.5_2.0']], 10);
    }
  });

  test('primal and dual form are the same regression: weights, noise, variance and its gradient', () => {
    const size = fc.integer({ min: 2, max: 9 });
    fc.assert(
      fc.property(size, size, fc.nat(500), fc.constantFrom(0.1, 1, 30), (n, p, seed, penalty) => {
        const drawn = normalTerms(n, p, seed);
        const [primal, dual] = (['primal', 'dual'] as const).map((form) =>
          fitRidge(makeRidgeSystem(drawn.terms, drawn.targets, { form }), penalty),
        ) as [ReturnType<typeof fitRidge>, ReturnType<typeof fitRidge>];
        const at = normalTerms(3, p, seed + 1).terms;
        expectClose(dual.weights, primal.weights, 8);
        expect(dual.noise).toBeCloseTo(primal.noise, 8);
        expectClose(dual.variance(at), primal.variance(at), 8);
        const row = at.values.slice(0, p);
        expectClose(dual.halfVarianceGradient(row), primal.halfVarianceGradient(row), 8);
      }),
      { numRuns: 50 },
    );
  });

  test.each(['primal', 'dual'] as const)(
    'drawn weights have the posterior covariance, in %s form',
    (form) => {
      const drawn = normalTerms(6, 4, 1);
      const fit = fitRidge(makeRidgeSystem(drawn.terms, drawn.targets, { form }), 0.7);
      const stream = rootStream(2);
      const draws = 8000;
      const directions = [Float64Array.of(1, 0, 0, 0), Float64Array.of(1, -1, 0.5, 2)];
      const squares = [0, 0];
      for (let k = 0; k < draws; k++) {
        const weights = fit.drawWeights(stream);
        directions.forEach((direction, j) => {
          squares[j]! +=
            direction.reduce((sum, d, f) => sum + d * (weights[f]! - fit.weights[f]!), 0) ** 2 / draws;
        });
      }
      directions.forEach((direction, j) => {
        // variance(terms) at means + direction, less the intercept's share noise / n; standard error of a variance √(2/draws)
        const { means } = makeRidgeSystem(drawn.terms, drawn.targets);
        const at = { rows: 1, columns: 4, values: direction.map((d, f) => d + means[f]!) };
        const exact = fit.variance(at)[0]! - fit.noise / 6;
        expect(Math.abs(squares[j]! / exact - 1)).toBeLessThan(4 * Math.sqrt(2 / draws));
      });
    },
  );
});

describe('leaveOneOutResiduals(system, penalty)', () => {
  test('are those of regressions that really leave the row out, in both forms', () => {
    // leaving a row out moves the mean of the terms, which the closed form covers since the intercept is not penalized
    for (const [n, p] of [
      [9, 3],
      [5, 8],
    ] as const) {
      const { terms, targets } = normalTerms(n, p, n);
      const really = Float64Array.from({ length: n }, (_, i) => {
        const others = Array.from({ length: n }, (_, k) => k).filter((k) => k !== i);
        const fit = fitRidge(
          makeRidgeSystem(
            takeRows(terms, others),
            targets.filter((_, k) => k !== i),
          ),
          0.6,
        );
        return targets[i]! - fit.mean(takeRows(terms, [i]))[0]!;
      });
      for (const form of ['primal', 'dual'] as const) {
        expectClose(leaveOneOutResiduals(makeRidgeSystem(terms, targets, { form }), 0.6), really, 9);
      }
    }
  });
});

describe('choosePenalty(system)', () => {
  test('is large where the targets are noise, small where they are linear', () => {
    const { terms, targets } = normalTerms(40, 10, 3);
    const linear = Float64Array.from(
      { length: 40 },
      (_, i) => 2 * terms.values[10 * i]! - terms.values[10 * i + 3]!,
    );
    expect(choosePenalty(makeRidgeSystem(terms, targets))).toBeGreaterThan(10);
    expect(choosePenalty(makeRidgeSystem(terms, linear))).toBeLessThan(0.01);
  });
});
