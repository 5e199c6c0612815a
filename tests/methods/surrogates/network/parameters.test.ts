import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../../harness/random.js';
import { freshParameters, parameterArrays } from '../../../../methods/surrogates/network/parameters.js';

describe('freshParameters(inputs, hiddenWidths, stream)', () => {
  test('chains the layers from the inputs over the hidden widths to one output', () => {
    const layers = freshParameters(3, [5, 2], rootStream(1));
    expect(layers.map(({ inputs, outputs }) => [inputs, outputs])).toEqual([
      [3, 5],
      [5, 2],
      [2, 1],
    ]);
    expect(parameterArrays(layers).map((array) => array.length)).toEqual([15, 5, 10, 2, 2, 1]);
  });

  test('draws weights and biases uniformly within ±1/√inputs', () => {
    const [layer] = freshParameters(16, [5000], rootStream(1));
    for (const values of [layer!.weights, layer!.biases]) {
      let largest = 0;
      let squares = 0;
      for (const value of values) {
        largest = Math.max(largest, Math.abs(value));
        squares += value ** 2;
      }
      expect(largest).toBeLessThanOrEqual(0.25);
      expect(largest).toBeGreaterThan(0.249);
      // A uniform number on ±b has variance b²/3; 5,000 of them show it to within 4 standard errors of 1.3 % each.
      expect(squares / values.length / (0.25 ** 2 / 3)).toBeCloseTo(1, 1);
    }
  });

  test('gives the same numbers for the same stream and others for another', () => {
    const draw = (seed: number) => parameterArrays(freshParameters(2, [3], rootStream(seed)));
    expect(draw(1)).toEqual(draw(1));
    expect(draw(1)).not.toEqual(draw(2));
  });
});
