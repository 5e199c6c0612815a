import { expect } from 'vitest';

/**
 * Expects as many numbers as `expected`, each within `tolerance` · max(1, |expected|) of it; for results of 32-bit
 * arithmetic, whose rounding is 6e-8 an operation.
 */
export function expectClose(
  actual: ArrayLike<number>,
  expected: ArrayLike<number>,
  tolerance: number,
  label = '',
): void {
  expect(actual.length, label).toBe(expected.length);
  for (let i = 0; i < expected.length; i++) {
    const off = Math.abs(actual[i]! - expected[i]!);
    const message = `${label}[${i}]: ${actual[i]} against ${expected[i]}`;
    expect(off, message).toBeLessThanOrEqual(tolerance * Math.max(1, Math.abs(expected[i]!)));
  }
}
