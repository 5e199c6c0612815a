import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows, rowView } from '../../harness/designs.js';
import { encode, makeEncoding } from '../../harness/encoding.js';
import { rootStream } from '../../harness/random.js';
import { makeSpace } from '../../harness/space.js';
import { ascentStep } from '../../methods/ascent-step.js';
import { arbitraryDesigns, runs } from '../harness/arbitrary-space.js';

describe('ascentStep(encoding, x, gradient, stepSize)', () => {
  const space = makeSpace([
    { kind: 'continuous', name: 'heat', low: 20, high: 90 },
    { kind: 'category', name: 'dye', levels: ['red', 'green', 'blue'] },
  ]);

  test('moves rows by stepSize · √width · gradient, and then to the nearest relaxed row', () => {
    const x = matrixFromRows([
      [0.5, 1, 0, 0],
      [0.9, 0, 1, 0],
      [0.1, 0.2, 0.3, 0.5],
    ]);
    const gradient = matrixFromRows([
      [1, -1, 1, 0],
      [2, 0, 0, 0],
      [-3, 1, 1, 1],
    ]);
    ascentStep(makeEncoding(space), x, gradient, 0.1);
    // Four features: each moves by 0.2 · gradient. By hand: 0.8 and 0.2 sum to 1; 1.3 and −0.5 are cut to the bounds;
    // 0.4, 0.5 and 0.7 lie 0.2 each above the simplex.
    const expected = [0.7, 0.8, 0.2, 0, 1, 0, 1, 0, 0, 0.2, 0.3, 0.5];
    expected.forEach((value, k) => {
      expect(x.values[k], `value ${k}`).toBeCloseTo(value, 14);
    });
  });

  test('keeps rows in the relaxed space whatever the gradient', () => {
    fc.assert(
      fc.property(
        arbitraryDesigns(3),
        fc.nat(),
        fc.constantFrom(1e-6, 0.1, 1e6),
        ({ space, designs }, seed, size) => {
          const encoding = makeEncoding(space);
          const x = encode(encoding, designs);
          const stream = rootStream(seed);
          for (let step = 0; step < 3; step++) {
            const gradient = { ...x, values: x.values.map(() => size * stream.normal()) };
            ascentStep(encoding, x, gradient, 0.3);
          }
          for (let i = 0; i < x.rows; i++) {
            const row = rowView(x, i);
            for (const { column, offset, width } of encoding.blocks) {
              const features = Array.from(row.subarray(offset, offset + width));
              for (const feature of features) {
                expect(feature).toBeGreaterThanOrEqual(0);
                expect(feature).toBeLessThanOrEqual(1 + 1e-12);
              }
              if (column.kind === 'category')
                expect(features.reduce((sum, feature) => sum + feature, 0)).toBeCloseTo(1, 12);
            }
          }
        },
      ),
      runs,
    );
  });

  test('leaves rows where the gradient is 0', () => {
    fc.assert(
      fc.property(arbitraryDesigns(3), ({ space, designs }) => {
        const encoding = makeEncoding(space);
        const x = encode(encoding, designs);
        const before = x.values.slice();
        ascentStep(encoding, x, { ...x, values: new Float64Array(x.values.length) }, 0.3);
        expect(x.values).toEqual(before);
      }),
      runs,
    );
  });
});
