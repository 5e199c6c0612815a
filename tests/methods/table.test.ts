import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { bestVisible, makeTable, scoreScale } from '../../methods/table.js';
import { makeOffer } from './contract.js';

test('makeTable(offer) holds the visible rows, encoded: numbers in shares of their range, categories one-hot', () => {
  const offer = {
    ...makeOffer('mixed'),
    designs: matrixFromRows([
      [55, 12, 1, 0],
      [20, 1, 2, 1],
    ]),
    scores: Float64Array.of(3, 4),
  };
  const table = makeTable(offer);
  expect(table.designs).toBe(offer.designs);
  expect(table.scores).toBe(offer.scores);
  expect(table.encoding.space).toBe(offer.space);
  expect(table.x).toEqual(
    matrixFromRows([
      [0.5, 1, 0, 1, 0, 0],
      [0, 0, 0, 0, 1, 1],
    ]),
  );
});

describe('bestVisible(table, count)', () => {
  const table = { designs: matrixFromRows([[10], [20], [30], [40]]), scores: Float64Array.of(2, 5, 2, 3) };
  const best = (count: number) => Array.from(bestVisible(table, count).values);

  test('gives the rows with the highest scores, best first, equal ones in the table’s order', () => {
    expect(best(2)).toEqual([20, 40]);
    expect(best(4)).toEqual([20, 40, 10, 30]);
  });

  test('goes through a short table again from its best row on', () => {
    expect(best(6)).toEqual([20, 40, 10, 30, 20, 40]);
  });
});

describe('scoreScale(scores)', () => {
  test('gives the mean and the standard deviation with divisor n − 1', () => {
    // By hand: mean 5, squares 9 + 1 + 1 + 1 + 0 + 0 + 4 + 16 = 32, √(32 / 7).
    const { mean, deviation } = scoreScale(Float64Array.of(2, 4, 4, 4, 5, 5, 7, 9));
    expect(mean).toBe(5);
    expect(deviation).toBeCloseTo(Math.sqrt(32 / 7), 14);
  });

  test.each([
    ['one score', [7]],
    ['constant scores', [7, 7, 7]],
  ])('gives deviation 1 for %s', (_, scores) => {
    expect(scoreScale(Float64Array.from(scores))).toEqual({ mean: 7, deviation: 1 });
  });
});
