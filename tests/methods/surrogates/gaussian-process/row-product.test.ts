import fc from 'fast-check';
import { expect, test } from 'vitest';
import { rootStream } from '../../../../harness/random.js';
import { RowProduct } from '../../../../methods/surrogates/gaussian-process/row-product.js';

test('multiply(row, count, into) is the full product whatever rows came before', () => {
  const entry = fc.constantFrom(0, 0, 0, 1, 0.5, -2);
  const rows = fc.array(fc.array(entry, { minLength: 6, maxLength: 6 }), { minLength: 1, maxLength: 8 });
  const stream = rootStream(1);
  const matrix = Float64Array.from({ length: 6 * 4 }, () => stream.normal());
  fc.assert(
    fc.property(rows, fc.integer({ min: 1, max: 4 }), (given, count) => {
      const product = new RowProduct(matrix, 6, 4);
      for (const row of given) {
        const into = new Float64Array(4).fill(7);
        product.multiply(Float64Array.from(row), count, into);
        for (let k = 0; k < 4; k++) {
          const full = row.reduce((sum: number, value, f) => sum + value * matrix[4 * f + k]!, 0);
          expect(into[k]).toBeCloseTo(k < count ? full : 7, 12);
        }
      }
    }),
  );
});
