import { expect, test } from 'vitest';
import { escapeLatex, latexNumber } from '../../../results/tables/latex-text.js';

// LaTeX's special characters and accent commands: Lamport 1994, "LaTeX: A Document Preparation System", from memory.
test.each([
  ['a_b & 5 % of #1 for $2', 'a\\_b \\& 5 \\% of \\#1 for \\$2'],
  ['{x}^2~\\', '\\{x\\}\\textasciicircum{}2\\textasciitilde{}\\textbackslash{}'],
  ['a < b > c | d', 'a \\textless{} b \\textgreater{} c \\textbar{} d'],
  ['Köln, Łódź, señor, naïve', 'K{\\"{o}}ln, \\L{}{\\\'{o}}d{\\\'{z}}, se{\\~{n}}or, na{\\"{\\i}}ve'],
  ['±0.02 ≤ 1', '$\\pm$0.02 $\\le$ 1'],
  ['two--dashes and -- ligatures', 'two{-}{-}dashes and {-}{-} ligatures'],
  ['材', '{[}U+6750{]}'],
  ['line\nbreak', 'line break'],
])('escapeLatex(%j) is %j', (text, escaped) => {
  expect(escapeLatex(text)).toBe(escaped);
});

test('escapeLatex gives the same for composed and decomposed accents', () => {
  expect(escapeLatex('e\u0301')).toBe(escapeLatex('\u00e9'));
});

test('latexNumber sets a minus sign', () => {
  expect(latexNumber('-0.07 [-0.10, +0.01]')).toBe('$-$0.07 {[}$-$0.10, +0.01{]}');
});
