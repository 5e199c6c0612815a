import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../../harness/designs.js';
import { Archive } from '../../../methods/searches/archive.js';

/** Sorts everything at once; equal values keep their order of arrival. */
function bruteForce(designs: readonly number[][], value: (design: number[]) => number, capacity: number) {
  const distinct = designs.filter((design, i) => designs.findIndex((d) => d.join() === design.join()) === i);
  return distinct.sort((a, b) => value(b) - value(a)).slice(0, capacity);
}

describe('Archive', () => {
  test('best() holds what sorting all distinct designs at once gives, however they came', () => {
    const design = fc.array(fc.integer({ min: 0, max: 3 }), { minLength: 2, maxLength: 2 });
    const value = ([a, b]: number[]) => (5 * a! + 3 * b!) % 7;
    fc.assert(
      fc.property(
        fc.array(fc.array(design, { minLength: 1, maxLength: 12 }), { minLength: 1, maxLength: 8 }),
        fc.integer({ min: 1, max: 10 }),
        (generations, capacity) => {
          const archive = new Archive(capacity, 2);
          for (const rows of generations) archive.add(matrixFromRows(rows), Float64Array.from(rows, value));
          const expected = bruteForce(generations.flat(), value, capacity);
          expect(archive.best()).toEqual({
            designs: matrixFromRows(expected, 2),
            values: Float64Array.from(expected, value),
          });
        },
      ),
    );
  });

  test('batch() goes through the designs again from the best when fewer than its capacity were seen', () => {
    const archive = new Archive(5, 1);
    archive.add(matrixFromRows([[1], [2], [1]]), Float64Array.of(10, 20, 10));
    expect(archive.batch()).toEqual(matrixFromRows([[2], [1], [2], [1], [2]]));
  });

  test('add(designs, values) copies, so that the caller can reuse its matrix', () => {
    const archive = new Archive(1, 1);
    const designs = matrixFromRows([[1]]);
    archive.add(designs, Float64Array.of(10));
    designs.values[0] = 9;
    expect(archive.best().designs).toEqual(matrixFromRows([[1]]));
  });
});
