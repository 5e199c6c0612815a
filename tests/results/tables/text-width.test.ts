import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  oneLine,
  padTextEnd,
  padTextStart,
  textWidth,
  truncateText,
  wrapText,
} from '../../../results/tables/text-width.js';

describe('textWidth(text)', () => {
  // Widths by Unicode Standard Annex 11: wide and full-width characters take two columns.
  it.each([
    ['abc', 3],
    ['–…─·', 4],
    ['é', 1],
    ['e\u0301', 1],
    ['材料', 4],
    ['ｶﾅ', 2],
    ['한글', 4],
    ['👩‍🔬', 2],
  ])('textWidth(%j) is %d', (text, width) => {
    expect(textWidth(text)).toBe(width);
  });
});

describe('truncateText, padTextStart and padTextEnd', () => {
  it('cut with an ellipsis only what is too long', () => {
    expect(truncateText('conservative', 12)).toBe('conservative');
    expect(truncateText('conservative', 6)).toBe('conse…');
    expect(truncateText('材料最適化', 6)).toBe('材料…');
  });

  it('give exactly the width asked for, whatever the text', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme' }), fc.integer({ min: 1, max: 40 }), (any, width) => {
        const text = oneLine(any);
        expect(textWidth(truncateText(text, width))).toBeLessThanOrEqual(width);
        expect(textWidth(padTextStart(truncateText(text, width), width))).toBe(width);
        expect(textWidth(padTextEnd(truncateText(text, width), width))).toBe(width);
      }),
    );
  });
});

describe('wrapText(text, width, indent)', () => {
  it('breaks at spaces and indents the lines that follow', () => {
    expect(wrapText('one batch of many designs', 11, '  ')).toEqual(['one batch', '  of many', '  designs']);
  });

  it('loses no word that fits', () => {
    fc.assert(
      fc.property(fc.array(fc.stringMatching(/^[a-z]{1,8}$/), { minLength: 1 }), (words) => {
        const lines = wrapText(words.join(' '), 12, '  ');
        expect(lines.flatMap((line) => line.trim().split(' '))).toEqual(words);
        expect(Math.max(...lines.map(textWidth))).toBeLessThanOrEqual(12);
      }),
    );
  });
});

describe('oneLine(text)', () => {
  it('replaces what would break the line or steer the terminal', () => {
    expect(oneLine('a\r\nb\u001b[1mc\u2028d')).toBe('a b [1mc d');
  });
});
