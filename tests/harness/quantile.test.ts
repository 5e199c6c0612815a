import { describe, expect, test } from 'vitest';
import { quantile } from '../../harness/quantile.js';
import reference from '../reference/statistics.json' with { type: 'json' };

// Source: the `source` field of `quantiles` (Hyndman & Fan 1996 type 7, computed with numpy and R).
const { x, p, types, type7_more: more } = reference.quantiles;

describe('quantile(values, p)', () => {
  const cases = [
    ...p.map((share, i) => ({ x, p: share, expected: types[7][i]! })),
    ...more.flatMap((sample) =>
      sample.p.map((share, i) => ({ x: sample.x, p: share, expected: sample.q[i]! })),
    ),
  ];

  test.each(cases)('quantile($x, $p) is $expected by type 7', ({ x, p, expected }) => {
    expect(quantile(x, p)).toBeCloseTo(expected, 12);
    expect(quantile([...x].reverse(), p)).toBeCloseTo(expected, 12);
  });

  test('the reference sample tells type 7 from types 4, 5, 6, 8 and 9', () => {
    const ours = p.map((share) => quantile(x, share));
    for (const other of [types[4], types[5], types[6], types[8], types[9]]) {
      expect(Math.max(...other.map((value, i) => Math.abs(value - ours[i]!)))).toBeGreaterThan(0.1);
    }
  });

  test('leaves the values in their order', () => {
    const values = Float64Array.of(3, 1, 2);
    quantile(values, 0.5);
    expect(values).toEqual(Float64Array.of(3, 1, 2));
  });

  test('is NaN when a value is', () => {
    expect(quantile([1, Number.NaN, 2], 0)).toBeNaN();
  });

  test('refuses no values, and p outside [0, 1]', () => {
    expect(() => quantile([], 0.5)).toThrow(RangeError);
    for (const p of [-0.1, 1.1, Number.NaN]) expect(() => quantile([1, 2], p)).toThrow(RangeError);
  });
});
