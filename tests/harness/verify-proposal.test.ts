import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { findFault } from '../../harness/verify-proposal.js';
import { mixedSpace } from './toy-stage.js';

const rows = (...values: number[][]) => matrixFromRows(values);
const two = rows([1, 2, 0], [10, 5, 2]);
const fault = (proposal: unknown) => findFault(proposal, mixedSpace, 2);

describe('findFault', () => {
  test('finds none in a proposal that keeps the contract', () => {
    expect(fault({ designs: two })).toBeUndefined();
    expect(
      fault({
        designs: rows([0, 1, 0], [0, 1, 0]),
        believed: Float64Array.of(1, -1e300),
        spread: Float64Array.of(0, 1),
        trace: [
          { step: 0, designs: rows([0, 1, 0]), believed: Float64Array.of(3) },
          { step: 5, designs: two, believed: Float64Array.of(3, 4) },
        ],
      }),
    ).toBeUndefined();
  });

  test('knows no obligation to believe, to be unsure or to trace', () => {
    expect(fault({ designs: two, believed: undefined, spread: undefined, trace: undefined })).toBeUndefined();
    expect(fault({ designs: two, trace: [] })).toBeUndefined();
  });

  test.each<[unknown, string]>([
    [undefined, 'returned no proposal'],
    [null, 'returned no proposal'],
    ['a word', 'returned no proposal'],
    [[], 'returned no designs'],
    [{}, 'returned no designs'],
    [{ designs: null }, 'returned no designs'],
    [{ designs: 3 }, 'returned no designs'],
    [{ designs: [[1, 2, 0]] }, 'returned designs that are no matrix of 64-bit floats'],
    [
      { designs: { ...two, values: [1, 2, 0, 1, 2, 0] } },
      'returned designs that are no matrix of 64-bit floats',
    ],
    [
      { designs: { ...two, values: new Float32Array(6) } },
      'returned designs that are no matrix of 64-bit floats',
    ],
    [{ designs: { ...two, rows: '2' } }, 'returned designs that are no matrix of 64-bit floats'],
    [{ designs: { values: two.values } }, 'returned designs that are no matrix of 64-bit floats'],
    [{ designs: rows([1, 2, 0]) }, 'returned 1 designs, 2 were asked for'],
    [{ designs: rows([1, 2, 0], [1, 2, 0], [1, 2, 0]) }, 'returned 3 designs, 2 were asked for'],
    [{ designs: { ...two, rows: Number.NaN } }, 'returned NaN designs, 2 were asked for'],
    [{ designs: rows([1, 2], [1, 2]) }, 'returned designs of 2 columns, the space has 3'],
    [{ designs: { ...two, values: new Float64Array(5) } }, 'returned 5 values for 2 designs of 3 columns'],
  ])('%o: %s', (proposal, words) => {
    expect(fault(proposal)).toBe(words);
  });

  test.each<[number[], string]>([
    [[Number.NaN, 2, 0], 'column "dial": NaN is not a finite number'],
    [[Number.POSITIVE_INFINITY, 2, 0], 'column "dial": Infinity is not a finite number'],
    [[-1e-9, 2, 0], 'column "dial": -1e-9 lies outside 0 to 10'],
    [[10.5, 2, 0], 'column "dial": 10.5 lies outside 0 to 10'],
    [[1, 0, 0], 'column "count": 0 lies outside 1 to 5'],
    [[1, 2.5, 0], 'column "count": 2.5 is not a whole number'],
    [[1, Number.NaN, 0], 'column "count": NaN is not a finite number'],
    [[1, 2, 3], 'column "kind": 3 is not the index of one of 3 levels'],
    [[1, 2, -1], 'column "kind": -1 is not the index of one of 3 levels'],
    [[1, 2, 0.5], 'column "kind": 0.5 is not the index of one of 3 levels'],
  ])('design %j: %s', (design, words) => {
    expect(fault({ designs: rows([1, 2, 0], design) })).toBe(`design 2, ${words}`);
  });

  test.each(['believed', 'spread'])('"%s" must be one finite number a design', (name) => {
    const wrong = `"${name}" is not one number a design`;
    expect(fault({ designs: two, [name]: null })).toBe(wrong);
    expect(fault({ designs: two, [name]: [1, 2] })).toBe(wrong);
    expect(fault({ designs: two, [name]: Float64Array.of(1) })).toBe(wrong);
    expect(fault({ designs: two, [name]: Float64Array.of(1, 2, 3) })).toBe(wrong);
    expect(fault({ designs: two, [name]: Float64Array.of(1, Number.NaN) })).toBe(
      `"${name}" of design 2 is NaN, not a finite number`,
    );
    expect(fault({ designs: two, [name]: Float64Array.of(Number.NEGATIVE_INFINITY, 2) })).toBe(
      `"${name}" of design 1 is -Infinity, not a finite number`,
    );
  });

  test('a spread is never negative', () => {
    expect(fault({ designs: two, spread: Float64Array.of(1, -1) })).toBe(
      '"spread" of design 2 is -1, less than 0',
    );
  });

  const good = { step: 3, designs: two, believed: Float64Array.of(1, 2) };

  test.each<[string, unknown, string]>([
    ['no list', {}, '"trace" is not a list of steps'],
    ['nothing as a step', [good, null], 'a step of "trace" has no number'],
    ['a step without a number', [{ ...good, step: undefined }], 'a step of "trace" has no number'],
    ['a step that is a word', [{ ...good, step: '3' }], 'a step of "trace" has no number'],
    ['a step without designs', [{ ...good, designs: undefined }], 'trace step 3: returned no designs'],
    [
      'a step without beliefs',
      [{ ...good, believed: undefined }],
      'trace step 3: "believed" is not one number a design',
    ],
    [
      'a belief too few',
      [{ ...good, believed: Float64Array.of(1) }],
      'trace step 3: "believed" is not one number a design',
    ],
    [
      'a belief that is no number',
      [good, { ...good, step: 4, believed: Float64Array.of(1, Number.NaN) }],
      'trace step 4: "believed" of design 2 is NaN, not a finite number',
    ],
    [
      'a design outside the space',
      [{ ...good, designs: rows([1, 2, 0], [1, 9, 0]) }],
      'trace step 3: design 2, column "count": 9 lies outside 1 to 5',
    ],
    [
      'too few values',
      [{ ...good, designs: { ...two, rows: 3 } }],
      'trace step 3: returned 6 values for 3 designs of 3 columns',
    ],
  ])('a trace with %s', (_, trace, words) => {
    expect(fault({ designs: two, trace })).toBe(words);
  });
});
