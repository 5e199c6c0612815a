import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { nearestWord, suggestion } from '../../harness/nearest-word.js';

const words = ['rastrigin', 'rosenbrock', 'nk', 'ising', 'budgetSeconds'];

describe('nearestWord', () => {
  test.each([
    ['rastrign', 'rastrigin'],
    ['Rosenbrok', 'rosenbrock'],
    ['isng', 'ising'],
    ['budgetseconds', 'budgetSeconds'],
    ['nkk', 'nk'],
  ])('takes "%s" for "%s"', (misspelt, meant) => {
    expect(nearestWord(misspelt, words)).toBe(meant);
  });

  test('finds nothing for a word that is far from all, or when nothing is known', () => {
    expect(nearestWord('photosynthesis', words)).toBeUndefined();
    expect(nearestWord('ising', [])).toBeUndefined();
  });

  test('finds the word that one letter was dropped from', () => {
    const dropped = fc
      .constantFrom(...words.filter((word) => word.length > 4))
      .chain((word) => fc.nat(word.length - 1).map((at) => ({ word, at })));
    fc.assert(
      fc.property(dropped, ({ word, at }) => {
        expect(nearestWord(word.slice(0, at) + word.slice(at + 1), words)).toBe(word);
      }),
    );
  });
});

describe('suggestion', () => {
  test('names the nearest word and all there are', () => {
    expect(suggestion('isng', ['nk', 'ising'])).toBe('did you mean "ising"? There is: nk, ising');
  });

  test('only lists when none is near', () => {
    expect(suggestion('photosynthesis', ['nk', 'ising'])).toBe('there is: nk, ising');
  });

  test('says so when there is none', () => {
    expect(suggestion('steps', [])).toBe('there is none');
  });
});
