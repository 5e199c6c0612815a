import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatCount,
  formatDifference,
  formatScore,
  formatSeconds,
  supportedDecimals,
} from '../../results/format-number.js';

describe('formatScore(value, decimals)', () => {
  it.each([
    [0.8124, 3, '0.812'],
    [-0.0001, 3, '0.000'],
    [0.8124, 2, '0.81'],
    [9.9996, 3, '10.00'],
    [12.3456, 3, '12.35'],
    [123.456, 3, '123.5'],
    [123.456, 1, '123'],
    [999.96, 3, '1.0e3'],
    [-1.5e5, 3, '-1.5e5'],
    [-1.44e5, 1, '-1.4e5'],
    [Number.NaN, 3, '–'],
  ])('formatScore(%d, %d) is %s', (value, decimals, text) => {
    expect(formatScore(value, decimals)).toBe(text);
  });

  it('gives large numbers with as many decimals as asked for', () => {
    expect([0, 1, 2].map((digits) => formatScore(-1.44e5, 3, digits))).toEqual(['-1e5', '-1.4e5', '-1.44e5']);
  });

  it('takes at most eight characters for any number, and six for scores up to a billion', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true }), fc.integer({ min: 1, max: 3 }), (value, decimals) => {
        const text = formatScore(value, decimals);
        expect(text.length).toBeLessThanOrEqual(Math.abs(value) < 1e9 ? 6 : 8);
      }),
    );
  });
});

describe('formatDifference(value, decimals)', () => {
  it('marks what is above 0, but not what rounds to 0', () => {
    expect([0.2, 0.0001, -0.2, 1.5e5].map((value) => formatDifference(value))).toEqual([
      '+0.200',
      '0.000',
      '-0.200',
      '+1.5e5',
    ]);
  });
});

describe('formatSeconds, formatCount and supportedDecimals', () => {
  it('gives seconds with one decimal up to 100', () => {
    expect([0, 0.01, 4.21, 99.97, 1234.5, 1.5e6].map(formatSeconds)).toEqual([
      '0.0',
      '<0.1',
      '4.2',
      '100',
      '1235',
      '1.5e6',
    ]);
  });

  it('gives whole counts without decimals', () => {
    expect([128, 12.44].map(formatCount)).toEqual(['128', '12.4']);
  });

  it('allows a third decimal only to a narrow interval', () => {
    expect([null, { low: 0.1, high: 0.2 }, { low: 0.1, high: 0.11 }].map(supportedDecimals)).toEqual([
      2, 2, 3,
    ]);
  });
});
