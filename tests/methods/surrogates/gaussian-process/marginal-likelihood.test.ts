import { describe, expect, test } from 'vitest';
import { encode, makeEncoding } from '../../../../harness/encoding.js';
import { rootStream } from '../../../../harness/random.js';
import { makeSpace, sampleUniform } from '../../../../harness/space.js';
import { fitHyperParameters } from '../../../../methods/surrogates/gaussian-process/fit-hyper-parameters.js';
import { toLogarithms } from '../../../../methods/surrogates/gaussian-process/hyper-parameters.js';
import { makeKernelLayout } from '../../../../methods/surrogates/gaussian-process/kernel-layout.js';
import {
  logMarginalLikelihood,
  makePairDistances,
} from '../../../../methods/surrogates/gaussian-process/marginal-likelihood.js';
import { hyperParameters, layout, reference, targets, x } from './reference.js';

function mixedProblem(sharedAbove: number) {
  const space = makeSpace([
    { kind: 'continuous', name: 'c', low: 0, high: 5 },
    { kind: 'category', name: 'k', levels: ['p', 'q', 'r', 's'] },
    { kind: 'integer', name: 'i', low: 0, high: 9 },
  ]);
  const encoding = makeEncoding(space);
  const designs = sampleUniform(space, 25, rootStream(5));
  const scores = Float64Array.from({ length: 25 }, (_, i) => {
    const [c, k, n] = designs.values.subarray(3 * i, 3 * i + 3);
    return Math.sin(c!) + 0.3 * k! - 0.02 * n! ** 2;
  });
  const distances = makePairDistances(makeKernelLayout(encoding, sharedAbove), encode(encoding, designs));
  return { distances, scores };
}

describe('logMarginalLikelihood(distances, targets, logarithms)', () => {
  test('agrees with scikit-learn to 1e-8 (tests/reference/models.json)', () => {
    const distances = makePairDistances(layout, x);
    const { value } = logMarginalLikelihood(distances, targets, toLogarithms(hyperParameters));
    expect(Math.abs(value - reference.matern52_ard.log_marginal_likelihood)).toBeLessThan(1e-8);
  });

  test.each([50, 2])(
    'has the gradient of central differences, one length scale shared above %d columns',
    (shared) => {
      const { distances, scores } = mixedProblem(shared);
      const at = Float64Array.from({ length: distances.groups + 2 }, (_, j) => [-0.4, 0.3, 0.1, -2, -3][j]!);
      const gradient = logMarginalLikelihood(distances, scores, at).gradient();
      const step = 1e-5;
      at.forEach((value, j) => {
        const up = logMarginalLikelihood(distances, scores, at.with(j, value + step)).value;
        const down = logMarginalLikelihood(distances, scores, at.with(j, value - step)).value;
        expect(gradient[j]! / ((up - down) / (2 * step))).toBeCloseTo(1, 6);
      });
    },
  );

  test('one shared length scale is the same as equal length scales', () => {
    const apart = mixedProblem(50);
    const shared = mixedProblem(2);
    const one = logMarginalLikelihood(shared.distances, shared.scores, Float64Array.of(-0.2, 0.4, -3));
    const three = logMarginalLikelihood(
      apart.distances,
      apart.scores,
      Float64Array.of(-0.2, -0.2, -0.2, 0.4, -3),
    );
    expect(one.value).toBeCloseTo(three.value, 9);
    const [a, b, c] = three.gradient();
    expect(one.gradient()[0]).toBeCloseTo(a! + b! + c!, 8);
  });
});

describe('fitHyperParameters(distances, targets, starts, iterations, stream)', () => {
  test('never ends lower with more starts', () => {
    const { distances, scores } = mixedProblem(50);
    const values = [1, 2, 3, 5].map(
      (starts) => fitHyperParameters(distances, scores, starts, 15, rootStream(1)).value,
    );
    values.slice(1).forEach((value, k) => {
      expect(value).toBeGreaterThanOrEqual(values[k]!);
    });
  });

  test('gives a column that does not matter a longer length scale than one that does', () => {
    const space = makeSpace(
      ['matters', 'idle'].map((name) => ({ kind: 'continuous' as const, name, low: 0, high: 1 })),
    );
    const encoding = makeEncoding(space);
    const designs = sampleUniform(space, 60, rootStream(2));
    const scores = Float64Array.from({ length: 60 }, (_, i) => Math.sin(9 * designs.values[2 * i]!));
    const distances = makePairDistances(makeKernelLayout(encoding, 50), encode(encoding, designs));
    const { lengthScales } = fitHyperParameters(distances, scores, 2, 30, rootStream(1)).hyperParameters;
    expect(lengthScales[1]! / lengthScales[0]!).toBeGreaterThan(5);
  });
});
