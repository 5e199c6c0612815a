import { describe, expect, test } from 'vitest';
import { type Matrix, matrixFromRows, rowView, stackRows } from '../../../../harness/designs.js';
import { encode, makeEncoding } from '../../../../harness/encoding.js';
import { rootStream } from '../../../../harness/random.js';
import { type Column, makeSpace, sampleUniform } from '../../../../harness/space.js';
import { makeKernelLayout } from '../../../../methods/surrogates/gaussian-process/kernel-layout.js';
import { GaussianPosterior } from '../../../../methods/surrogates/gaussian-process/posterior.js';
import { hyperParameters, layout, reference, referencePosterior, targets, x, xTest } from './reference.js';

const expected = reference.matern52_ard;

function expectClose(actual: ArrayLike<number>, wanted: ArrayLike<number>, tolerance: number): void {
  expect(actual.length).toBe(wanted.length);
  for (let i = 0; i < wanted.length; i++) {
    expect(Math.abs(actual[i]! - wanted[i]!), `entry ${i}: ${actual[i]} against ${wanted[i]}`).toBeLessThan(
      tolerance,
    );
  }
}

/** Two scaled columns and a category, at 12 designs and at 3 relaxed rows that are no designs. */
function mixedPosterior(sharedAbove = 50): { posterior: GaussianPosterior; relaxed: Matrix } {
  const columns: Column[] = [
    { kind: 'continuous', name: 'c', low: -2, high: 3 },
    { kind: 'category', name: 'k', levels: ['p', 'q', 'r'] },
    { kind: 'integer', name: 'i', low: 0, high: 9 },
  ];
  const space = makeSpace(columns);
  const encoding = makeEncoding(space);
  const mixed = makeKernelLayout(encoding, sharedAbove);
  const stream = rootStream(3);
  const encoded = encode(encoding, sampleUniform(space, 12, stream));
  const scores = Float64Array.from({ length: 12 }, () => stream.normal());
  const parameters = {
    lengthScales: Float64Array.of(0.5, 1.2, 0.8).slice(0, mixed.groups),
    amplitude: 1.7,
    noise: 0.05,
  };
  const relaxed = matrixFromRows([
    [0.2, 0.5, 0.3, 0.2, 0.4],
    [0.9, 0.1, 0, 0.9, 0.1],
    [0.5, 0, 1, 0, 0.7],
  ]);
  return { posterior: new GaussianPosterior(mixed, parameters, encoded, scores), relaxed };
}

describe('GaussianPosterior against scikit-learn (tests/reference/models.json)', () => {
  test('mean, latent deviation and covariance agree to 1e-8', () => {
    const posterior = referencePosterior();
    expectClose(posterior.mean(xTest), expected.posterior_mean, 1e-8);
    expectClose(posterior.variance(xTest).map(Math.sqrt), expected.posterior_std_latent, 1e-8);
    const covariance = posterior.covariances(posterior.track(xTest), rowView(xTest, 1))[0]!;
    expectClose([covariance], [expected.posterior_cov_latent_0_1], 1e-8);
  });

  test('kernels(row) is the kernel row to 1e-12', () => {
    expectClose(referencePosterior().kernels(rowView(x, 0)), expected.K_row0_without_noise, 1e-12);
  });
});

describe('GaussianPosterior', () => {
  test('goes through the targets when there is next to no noise', () => {
    const posterior = referencePosterior(0, 1e-10);
    expectClose(posterior.mean(x), targets, 1e-7);
    expectClose(posterior.variance(x), new Float64Array(targets.length), 1e-7);
  });

  test('the covariance of a tracked row with itself is its variance', () => {
    const posterior = referencePosterior();
    const tracked = posterior.track(xTest);
    for (let i = 0; i < xTest.rows; i++) {
      const own = posterior.covariances(tracked, rowView(xTest, i))[i]!;
      expectClose([own, tracked.variance[i]!], [posterior.variance(xTest)[i]!, own], 1e-12);
    }
  });

  test.each([0, 1, -2])(
    'gradient(x, %d) agrees with central differences, at relaxed rows of a mixed space',
    (weight) => {
      for (const { posterior, relaxed } of [mixedPosterior(), mixedPosterior(2)]) {
        const gradient = posterior.gradient(relaxed, weight);
        const value = (at: Matrix) => {
          const variance = posterior.variance(at);
          return posterior.mean(at).map((mean, i) => mean - weight * Math.sqrt(variance[i]!));
        };
        const step = 1e-5;
        for (let k = 0; k < relaxed.values.length; k++) {
          const up = { ...relaxed, values: relaxed.values.with(k, relaxed.values[k]! + step) };
          const down = { ...relaxed, values: relaxed.values.with(k, relaxed.values[k]! - step) };
          const row = Math.floor(k / relaxed.columns);
          const difference = (value(up)[row]! - value(down)[row]!) / (2 * step);
          expectClose([gradient.values[k]!], [difference], 1e-6);
        }
      }
    },
  );

  test('believe(row) equals a posterior built with the row and its mean, for new and tracked rows', () => {
    const posterior = referencePosterior(2);
    const tracked = posterior.track(xTest);
    const added = matrixFromRows([
      [0.33, 0.71],
      [0.9, 0.15],
    ]);
    const means = posterior.mean(added);
    posterior.believe(rowView(added, 0), tracked);
    posterior.believe(rowView(added, 1), tracked);
    const refitted = new GaussianPosterior(
      layout,
      hyperParameters,
      stackRows([x, added]),
      Float64Array.of(...targets, ...means),
    );
    expectClose(posterior.mean(xTest), refitted.mean(xTest), 1e-10);
    expectClose(posterior.variance(xTest), refitted.variance(xTest), 1e-10);
    expectClose(posterior.gradient(xTest, 1).values, refitted.gradient(xTest, 1).values, 1e-8);
    expectClose(tracked.variance, refitted.variance(xTest), 1e-10);
    expectClose(tracked.mean, refitted.mean(xTest), 1e-10);
  });

  test('believe(row) without room throws', () => {
    expect(() => referencePosterior().believe(rowView(x, 0))).toThrow(RangeError);
  });

  test('rows measured ten times over are no obstacle', () => {
    const rows = stackRows(Array.from({ length: 10 }, () => x));
    const repeated = Float64Array.from({ length: rows.rows }, (_, i) => targets[i % targets.length]!);
    const parameters = { ...hyperParameters, noise: 1e-6 };
    const posterior = new GaussianPosterior(layout, parameters, rows, repeated);
    expectClose(posterior.mean(x), targets, 1e-4);
  });
});
