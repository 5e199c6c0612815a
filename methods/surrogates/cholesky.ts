import { OnebatchError } from '../../harness/errors.js';

/** Sum of a[i0 + k] · b[j0 + k] over k = 0 … count − 1. */
export function dot(a: Float64Array, i0: number, b: Float64Array, j0: number, count: number): number {
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  let k = 0;
  for (; k + 3 < count; k += 4) {
    s0 += a[i0 + k]! * b[j0 + k]!;
    s1 += a[i0 + k + 1]! * b[j0 + k + 1]!;
    s2 += a[i0 + k + 2]! * b[j0 + k + 2]!;
    s3 += a[i0 + k + 3]! * b[j0 + k + 3]!;
  }
  for (; k < count; k++) s0 += a[i0 + k]! * b[j0 + k]!;
  return s0 + s1 + (s2 + s3);
}

/** A lower triangular L with L Lᵀ = A; entry (i, j ≤ i) stands at `i * stride + j`, the rest is not looked at. */
export interface Factor {
  readonly size: number;
  readonly stride: number;
  readonly values: Float64Array;
}

/**
 * Replaces the lower triangle of a symmetric matrix, (n, n) row-major with the given stride, by its Cholesky factor,
 * row by row; n³/6 multiplications. Only the lower triangle is read.
 *
 * @returns whether the matrix was positive definite; if not, its content is useless.
 */
export function choleskyInPlace(a: Float64Array, n: number, stride = n): boolean {
  for (let i = 0; i < n; i++) {
    const rowI = i * stride;
    for (let j = 0; j < i; j++) {
      const rowJ = j * stride;
      a[rowI + j] = (a[rowI + j]! - dot(a, rowI, a, rowJ, j)) / a[rowJ + j]!;
    }
    const pivot = a[rowI + i]! - dot(a, rowI, a, rowI, i);
    if (!(pivot > 0 && pivot < Number.POSITIVE_INFINITY)) return false;
    a[rowI + i] = Math.sqrt(pivot);
  }
  return true;
}

/**
 * The Cholesky factor of a symmetric matrix, (n, n) with n as stride, in storage that has `room` more rows and columns.
 * A matrix that rounding made indefinite (duplicate rows, say) gets 10⁻¹⁰ of its mean diagonal added to the diagonal,
 * then ten times as much again, up to 10⁻² (common practice).
 *
 * @throws OnebatchError (`numeric`) when even that is not positive definite, or a number is not finite.
 */
export function factorize(matrix: Float64Array, n: number, room = 0): Factor {
  const stride = n + room;
  const values = new Float64Array(stride * stride);
  let meanDiagonal = 0;
  for (let i = 0; i < n; i++) meanDiagonal += matrix[i * n + i]! / n;
  for (let jitter = 0; jitter <= 1.5e-2; jitter = jitter === 0 ? 1e-10 : jitter * 10) {
    for (let i = 0; i < n; i++) {
      values.set(matrix.subarray(i * n, i * n + i + 1), i * stride);
      values[i * stride + i]! += jitter * meanDiagonal;
    }
    if (choleskyInPlace(values, n, stride)) return { size: n, stride, values };
  }
  throw new OnebatchError(
    'numeric',
    `a ${n} by ${n} covariance is not positive definite even with 1% added to its diagonal; look for extreme values in the table`,
  );
}

/** Solves L v = b in place, b of length n at `at`; n²/2 multiplications. */
export function solveLowerInPlace({ size, stride, values }: Factor, b: Float64Array, at = 0): void {
  for (let i = 0; i < size; i++) {
    b[at + i] = (b[at + i]! - dot(values, i * stride, b, at, i)) / values[i * stride + i]!;
  }
}

/** Solves Lᵀ v = b in place, b of length n at `at`; n²/2 multiplications. */
export function solveUpperInPlace({ size, stride, values }: Factor, b: Float64Array, at = 0): void {
  for (let i = size - 1; i >= 0; i--) {
    const row = i * stride;
    const solved = b[at + i]! / values[row + i]!;
    b[at + i] = solved;
    for (let j = 0; j < i; j++) b[at + j]! -= solved * values[row + j]!;
  }
}

/** Solves A v = b for A = L Lᵀ, leaving b alone. */
export function solveFactored(factor: Factor, b: Float64Array): Float64Array {
  const solved = b.slice(0, factor.size);
  solveLowerInPlace(factor, solved);
  solveUpperInPlace(factor, solved);
  return solved;
}

/** L⁻ᵀ, (n, n): row i holds column i of L⁻¹, which is zero before entry i. n³/6 multiplications. */
export function invertTransposed({ size, stride, values }: Factor): Float64Array {
  const inverse = new Float64Array(size * size);
  for (let j = 0; j < size; j++) {
    const row = j * size;
    inverse[row + j] = 1 / values[j * stride + j]!;
    for (let i = j + 1; i < size; i++) {
      inverse[row + i] = -dot(values, i * stride + j, inverse, row + j, i - j) / values[i * stride + i]!;
    }
  }
  return inverse;
}

/** The diagonal of A⁻¹, (n), for A = L Lᵀ. */
export function inverseDiagonal(factor: Factor): Float64Array {
  const n = factor.size;
  const inverse = invertTransposed(factor);
  return Float64Array.from({ length: n }, (_, i) => dot(inverse, i * n + i, inverse, i * n + i, n - i));
}
