import { describe, expect, test } from 'vitest';
import { type Matrix, rowView } from '../../../harness/designs.js';
import { rootStream } from '../../../harness/random.js';
import { cmaEsParameters } from '../../../methods/searches/cma-es-parameters.js';
import { CmaEs, type CmaEsStart } from '../../../methods/searches/cma-es-state.js';
import { diagonalCovariance, fullCovariance } from '../../../methods/searches/covariance.js';
import models from '../../reference/models.json' with { type: 'json' };

type Score = (x: Float64Array) => number;
const sphere: Score = (x) => -x.reduce((sum, v) => sum + v * v, 0);
const rosenbrock: Score = (x) => {
  let sum = 0;
  for (let i = 0; i + 1 < x.length; i++) sum += 100 * (x[i + 1]! - x[i]! ** 2) ** 2 + (1 - x[i]!) ** 2;
  return -sum;
};

/** Runs until a score above −precision was seen: evaluations spent, or `limit` or more when it never was. */
function evaluationsTo(precision: number, score: Score, start: CmaEsStart, seed: number, limit = 20_000) {
  const strategy = new CmaEs(start);
  const stream = rootStream(seed);
  for (let spent = 0; ; ) {
    const points = strategy.ask(stream);
    const values = Float64Array.from({ length: points.rows }, (_, k) => score(rowView(points, k)));
    strategy.tell(points, values);
    spent += points.rows;
    if (Math.max(...values) > -precision || spent >= limit) return spent;
  }
}

const median = (values: number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1]!;
const seeds = [1, 2, 3, 4, 5];

describe('cmaEsParameters(n)', () => {
  // Hansen 2016, table 1; the rows were cross-checked against a general CMA-ES library, see the file's source field.
  test.each(models.cma_es_defaults.rows)('is the published default for n = $n', (row) => {
    const parameters = cmaEsParameters(row.n);
    expect(parameters.population).toBe(row.lambda);
    expect(parameters.parents).toBe(row.mu);
    row.weights.forEach((weight, i) => {
      expect(parameters.weights[i]).toBeCloseTo(weight, 14);
    });
    expect(parameters.effectiveParents).toBeCloseTo(row.mueff, 13);
    expect(parameters.cSigma).toBeCloseTo(row.c_sigma, 14);
    expect(parameters.dSigma).toBeCloseTo(row.d_sigma, 14);
    expect(parameters.cC).toBeCloseTo(row.c_c, 14);
    expect(parameters.c1).toBeCloseTo(row.c_1, 14);
    expect(parameters.cMu).toBeCloseTo(row.c_mu_without_quarter, 14);
    expect(parameters.expectedNorm).toBeCloseTo(row.chiN_approx, 13);
  });

  test('learns a diagonal covariance (n + 2)/3 times as fast (Ros & Hansen 2008)', () => {
    const full = cmaEsParameters(40);
    const diagonal = cmaEsParameters(40, { shape: 'diagonal' });
    expect(diagonal.c1 / full.c1).toBeCloseTo(14, 10);
    expect(diagonal.cMu / full.cMu).toBeCloseTo(14, 10);
  });

  test.each([1, 2, 10, 1000])('keeps both learning rates within a sum of 1, n = %i', (n) => {
    for (const population of [2, 4, 1000]) {
      for (const shape of ['full', 'diagonal'] as const) {
        const { c1, cMu, weights } = cmaEsParameters(n, { population, shape });
        expect(c1).toBeGreaterThan(0);
        expect(cMu).toBeGreaterThanOrEqual(0);
        expect(c1 + cMu).toBeLessThanOrEqual(1);
        expect(weights.reduce((sum, w) => sum + w, 0)).toBeCloseTo(1, 14);
      }
    }
  });
});

describe('CmaEs', () => {
  // About 1,600 evaluations take a sphere in 10 dimensions down eleven orders of magnitude; common practice.
  test('reaches 1e-10 on the 10-d sphere within 2,000 evaluations', () => {
    const start = { mean: new Float64Array(10).fill(1), sigma: 0.5 };
    expect(Math.max(...seeds.map((seed) => evaluationsTo(1e-10, sphere, start, seed)))).toBeLessThan(2000);
  });

  // The 5-d Rosenbrock function has a local optimum that catches a run now and then, hence the median; common practice.
  test('reaches 1e-8 on the 5-d Rosenbrock function within 3,000 evaluations, in the median of 5 runs', () => {
    const start = { mean: new Float64Array(5), sigma: 0.3 };
    expect(median(seeds.map((seed) => evaluationsTo(1e-8, rosenbrock, start, seed)))).toBeLessThan(3000);
  });

  test('learns the scales of an ellipsoid with condition number 1e6, the diagonal variant sooner', () => {
    const ellipsoid: Score = (x) =>
      -x.reduce((sum, v, i) => sum + 10 ** ((6 * i) / (x.length - 1)) * v * v, 0);
    const spent = (shape: 'full' | 'diagonal') =>
      evaluationsTo(1e-8, ellipsoid, { mean: new Float64Array(10).fill(1), sigma: 0.5, shape }, 1);
    expect(spent('full')).toBeLessThan(8000);
    expect(spent('diagonal')).toBeLessThan(0.75 * spent('full'));
  });

  test('draws the same samples for any order-preserving change of the values', () => {
    const run = (transform: (value: number) => number): Matrix[] => {
      const strategy = new CmaEs({ mean: new Float64Array(4).fill(0.7), sigma: 0.3 });
      const stream = rootStream(3);
      return Array.from({ length: 60 }, () => {
        const points = strategy.ask(stream);
        strategy.tell(
          points,
          Float64Array.from({ length: points.rows }, (_, k) => transform(rosenbrock(rowView(points, k)))),
        );
        return points;
      });
    };
    const plain = run((v) => v);
    expect(run((v) => -Math.sqrt(-v))).toEqual(plain);
    expect(run((v) => 1e6 + 1000 * v)).toEqual(plain);
  });

  test('moves with the function: a shifted start on a shifted sphere costs about the same evaluations', () => {
    const shifted: Score = (x) => sphere(x.map((v) => v - 8));
    const costs = (score: Score, first: number) =>
      evaluationsTo(1e-6, score, { mean: new Float64Array(6).fill(first), sigma: 0.5 }, 1);
    expect(costs(shifted, 9)).toBe(costs(sphere, 1));
  });

  test('stopReason() is "flat" when all values are equal for long, and undefined before', () => {
    const strategy = new CmaEs({ mean: new Float64Array(3), sigma: 1 });
    const stream = rootStream(1);
    const reasons = Array.from({ length: 30 }, () => {
      const points = strategy.ask(stream);
      strategy.tell(points, new Float64Array(points.rows));
      return strategy.stopReason();
    });
    // 10 + ⌈30 · 3 / 7⌉ generations
    expect(reasons.indexOf('flat')).toBe(22);
    expect(reasons.slice(0, 22).every((reason) => reason === undefined)).toBe(true);
  });

  test('does not keep the mean it was given', () => {
    const mean = new Float64Array(2);
    const strategy = new CmaEs({ mean, sigma: 1 });
    const points = strategy.ask(rootStream(1));
    strategy.tell(
      points,
      Float64Array.from({ length: points.rows }, (_, k) => k),
    );
    expect(mean).toEqual(new Float64Array(2));
    expect(strategy.mean).not.toEqual(mean);
    expect(strategy.generation).toBe(1);
  });
});

describe('covariance', () => {
  const update = {
    keep: 0.5,
    c1: 0.25,
    path: Float64Array.of(2, 2, 0),
    weights: Float64Array.of(0.75),
    steps: { rows: 1, columns: 3, values: Float64Array.of(0, 2, 2) },
  };

  test('fullCovariance(n).update(change) adds the outer products, and spread is its symmetric root', () => {
    // C = 0.5 I + 0.25 · (2, 2, 0)(2, 2, 0)ᵀ + 0.75 · (0, 2, 2)(0, 2, 2)ᵀ, by hand.
    const expected = [
      [1.5, 1, 0],
      [1, 4.5, 3],
      [0, 3, 3.5],
    ];
    const covariance = fullCovariance(3);
    covariance.update(update);
    expect(covariance.variances()).toEqual(Float64Array.of(1.5, 4.5, 3.5));
    for (let i = 0; i < 3; i++) {
      const unit = new Float64Array(3);
      unit[i] = 1;
      const column = covariance.spread(covariance.spread(unit));
      const back = covariance.whiten(covariance.spread(unit));
      for (let j = 0; j < 3; j++) {
        expect(column[j]).toBeCloseTo(expected[i]![j]!, 12);
        expect(back[j]).toBeCloseTo(unit[j]!, 12);
      }
    }
  });

  test('diagonalCovariance(n) learns the diagonal of the same', () => {
    const covariance = diagonalCovariance(3);
    covariance.update(update);
    expect(covariance.variances()).toEqual(Float64Array.of(1.5, 4.5, 3.5));
    expect(covariance.condition()).toBe(3);
    expect(covariance.whiten(covariance.spread(Float64Array.of(1, 2, 3)))[2]).toBeCloseTo(3, 14);
  });

  test('fullCovariance(n, 3) computes its axes again every third update only', () => {
    const covariance = fullCovariance(3, 3);
    const conditions = [1, 2, 3].map(() => {
      covariance.update(update);
      return covariance.condition();
    });
    expect(conditions.slice(0, 2)).toEqual([1, 1]);
    expect(conditions[2]).toBeGreaterThan(1);
  });
});
