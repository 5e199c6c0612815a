import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { OnebatchError } from '../../../harness/errors.js';
import { rootStream } from '../../../harness/random.js';
import {
  dot,
  factorize,
  inverseDiagonal,
  invertTransposed,
  solveFactored,
} from '../../../methods/surrogates/cholesky.js';

/** B Bᵀ + I for a normal B, (n, n). */
function positiveDefinite(n: number, seed: number): Float64Array {
  const stream = rootStream(seed);
  const b = Float64Array.from({ length: n * n }, () => stream.normal());
  return Float64Array.from({ length: n * n }, (_, k) => {
    const i = Math.floor(k / n);
    const j = k % n;
    return dot(b, i * n, b, j * n, n) + (i === j ? 1 : 0);
  });
}

const sizes = fc.tuple(fc.integer({ min: 1, max: 12 }), fc.integer({ min: 0, max: 1000 }));

describe('factorize(matrix, n, room)', () => {
  test('gives the textbook factor of [[4, 2], [2, 5]]: [[2, 0], [1, 2]]', () => {
    const { values, stride } = factorize(Float64Array.of(4, 2, 2, 5), 2, 1);
    expect(stride).toBe(3);
    expect([values[0], values[3], values[4]]).toEqual([2, 1, 2]);
  });

  test('solves A v = b whatever the room', () => {
    fc.assert(
      fc.property(sizes, fc.integer({ min: 0, max: 3 }), ([n, seed], room) => {
        const a = positiveDefinite(n, seed);
        const b = Float64Array.from({ length: n }, (_, i) => i - 1);
        const v = solveFactored(factorize(a, n, room), b);
        for (let i = 0; i < n; i++) expect(dot(a, i * n, v, 0, n)).toBeCloseTo(b[i]!, 9);
      }),
    );
  });

  test('adds to the diagonal of a matrix of equal rows instead of failing', () => {
    const { values } = factorize(new Float64Array(9).fill(2), 3);
    expect(values[0]! ** 2).toBeGreaterThan(2);
    expect(values[0]! ** 2).toBeLessThan(2.001);
  });

  test('throws a numeric error for a matrix that is far from positive definite', () => {
    expect(() => factorize(Float64Array.of(1, 2, 2, 1), 2)).toThrow(OnebatchError);
  });
});

describe('invertTransposed(factor), inverseDiagonal(factor)', () => {
  test('give L⁻ᵀ, whose rows multiply to A⁻¹', () => {
    fc.assert(
      fc.property(sizes, ([n, seed]) => {
        const a = positiveDefinite(n, seed);
        const factor = factorize(a, n);
        const u = invertTransposed(factor);
        const diagonal = inverseDiagonal(factor);
        for (let j = 0; j < n; j++) {
          const unit = new Float64Array(n);
          unit[j] = 1;
          const column = solveFactored(factor, unit);
          for (let i = 0; i < n; i++) expect(dot(u, i * n, u, j * n, n)).toBeCloseTo(column[i]!, 9);
          expect(diagonal[j]).toBeCloseTo(column[j]!, 9);
        }
      }),
    );
  });
});
