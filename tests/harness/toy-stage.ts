import type { Cell } from '../../harness/cells.js';
import { matrixFromRows, rowView } from '../../harness/designs.js';
import { makeSpace } from '../../harness/space.js';
import type { Stage } from '../../harness/stage.js';

/** One column of each kind. */
export const mixedSpace = makeSpace([
  { kind: 'continuous', name: 'dial', low: 0, high: 10 },
  { kind: 'integer', name: 'count', low: 1, high: 5 },
  { kind: 'category', name: 'kind', levels: ['a', 'b', 'c'] },
]);

/**
 * A stage whose numbers can be followed by hand: a design's true score is its dial, 0 … 10 become 0 … 1, and three
 * designs with dials 2, 3 and 5 are visible.
 */
export const dialStage: Stage = {
  space: mixedSpace,
  designs: matrixFromRows([
    [2, 1, 0],
    [3, 1, 0],
    [5, 1, 0],
  ]),
  scores: Float64Array.of(2.5, 2.5, 5.5),
  floor: 0,
  top: 10,
  topKnown: 'exact',
  bestVisible: 0.5,
  worstVisible: 0.2,
  normalize: (score) => score / 10,
  judge: (designs) => Float64Array.from({ length: designs.rows }, (_, i) => rowView(designs, i)[0]! / 10),
};

/** A cell to judge on it. */
export const dialCell: Cell = {
  key: { task: 'dial', curtain: 'open', method: 'hand', settings: '01234567', seed: 4 },
  task: { label: 'dial', family: 'dial', settings: {}, curtains: [{}] },
  curtain: {},
  method: { label: 'hand', method: 'hand', settings: {} },
  seed: 4,
};
