import { describe, expect, test } from 'vitest';
import { type Matrix, matrixFromRows, zeros } from '../../../../harness/designs.js';
import { encode, makeEncoding } from '../../../../harness/encoding.js';
import { makeSpace } from '../../../../harness/space.js';
import {
  makeScaling,
  scaleInputs,
  unscaleGradients,
} from '../../../../methods/surrogates/network/scaling.js';

const space = makeSpace([
  { kind: 'continuous', name: 'heat', low: -20, high: 80 },
  { kind: 'integer', name: 'switch', low: 0, high: 1 },
  { kind: 'integer', name: 'count', low: 3, high: 12 },
  { kind: 'category', name: 'dye', levels: ['red', 'green', 'blue'] },
  { kind: 'category', name: 'lid', levels: ['on', 'off'] },
]);
const encoding = makeEncoding(space);

describe('scaleInputs(makeScaling(encoding), x)', () => {
  test('moves every feature to mean 0 and standard deviation 1 over designs drawn uniformly', () => {
    // 6,000 designs in which every value of a column comes equally often; heat in the middles of equal intervals.
    const n = 6000;
    const designs = matrixFromRows(
      Array.from({ length: n }, (_, i) => [-20 + ((i + 0.5) / n) * 100, i % 2, 3 + (i % 10), i % 3, i % 2]),
    );
    const scaled = scaleInputs(makeScaling(encoding), encode(encoding, designs));
    for (let j = 0; j < encoding.width; j++) {
      const feature = Array.from({ length: n }, (_, i) => scaled[i * encoding.width + j]!);
      const mean = feature.reduce((sum, value) => sum + value, 0) / n;
      const variance = feature.reduce((sum, value) => sum + (value - mean) ** 2, 0) / n;
      expect(mean, `feature ${j}`).toBeCloseTo(0, 5);
      expect(variance, `feature ${j}`).toBeCloseTo(1, 5);
    }
  });

  test('leaves the rows as they were', () => {
    const x = encode(encoding, matrixFromRows([[0, 1, 3, 2, 0]]));
    const before = x.values.slice();
    scaleInputs(makeScaling(encoding), x);
    expect(x.values).toEqual(before);
  });
});

test('unscaleGradients(scaling, gradients, outputScale) is the chain rule through scaleInputs', () => {
  const scaling = makeScaling(encoding);
  const { width } = encoding;
  // A function that is linear in the inputs: its slope by a feature is what moving the feature by 1 does.
  const slopes = Float32Array.from({ length: width }, (_, j) => j - 2.5);
  const outputScale = 3;
  const score = (x: Matrix) =>
    outputScale * scaleInputs(scaling, x).reduce((sum, input, j) => sum + input * slopes[j]!, 0);
  const gradient = unscaleGradients(scaling, Float32Array.of(...slopes, ...slopes), outputScale);
  expect([gradient.rows, gradient.columns]).toEqual([2, width]);
  for (let k = 0; k < 2 * width; k++) {
    const moved = zeros(1, width);
    moved.values[k % width] = 1;
    expect(gradient.values[k]!).toBeCloseTo(score(moved) - score(zeros(1, width)), 4);
  }
});
