import { describe, expect, it } from 'vitest';
import { compareRows } from '../../../results/comparison.js';
import { tableFormats } from '../../../results/tables/index.js';
import { renderJson } from '../../../results/tables/json.js';
import { smallComparison, smallLedger } from './small-comparison.js';

describe('renderJson(comparison)', () => {
  it('gives the comparison back when it is parsed', () => {
    expect(JSON.parse(renderJson(smallComparison))).toEqual(smallComparison);
  });

  it('is the same text for the same rows in any order', () => {
    const options = { version: '0.1.0', resamples: 50 };
    expect(renderJson(compareRows([...smallLedger].reverse(), options))).toBe(
      renderJson(compareRows(smallLedger, options)),
    );
  });

  it('starts with the version and is indented by two spaces', () => {
    expect(renderJson(smallComparison).split('\n').slice(0, 3)).toEqual([
      '{',
      '  "version": "0.1.0",',
      '  "level": 0.95,',
    ]);
  });
});

describe('tableFormats', () => {
  it('names each file once, and every format gives text that ends with a line break', async () => {
    expect(tableFormats.map(({ file }) => file)).toEqual([
      'comparison.csv',
      'comparison.md',
      'comparison.json',
      'comparison.tex',
    ]);
    for (const { render } of tableFormats) expect((await render(smallComparison)).endsWith('\n')).toBe(true);
  });
});
