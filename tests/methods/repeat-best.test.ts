import { describe, expect, test } from 'vitest';
import { matrixFromRows, rowView } from '../../harness/designs.js';
import { repeatBest } from '../../methods/repeat-best.js';
import { describeMethodContract, makeOffer } from './contract.js';

describeMethodContract(repeatBest);

describe('repeatBest.propose(offer)', () => {
  const offer = {
    ...makeOffer('continuous'),
    designs: matrixFromRows([
      [30, 0, 0],
      [40, 0, 0],
      [50, 0, 0],
    ]),
    scores: Float64Array.of(1, 3, 2),
  };
  const heats = (batchSize: number) => {
    const { designs, believed } = repeatBest.propose({ ...offer, batchSize }, {}) as Awaited<
      ReturnType<typeof repeatBest.propose>
    >;
    return { heats: Array.from({ length: batchSize }, (_, i) => rowView(designs, i)[0]), believed };
  };

  test('takes the highest measured scores, best first, and believes them', () => {
    expect(heats(2)).toEqual({ heats: [40, 50], believed: Float64Array.of(3, 2) });
  });

  test('goes through a table smaller than the batch again from its best design', () => {
    expect(heats(5)).toEqual({ heats: [40, 50, 30, 40, 50], believed: Float64Array.of(3, 2, 1, 3, 2) });
  });

  test('counts a design measured twice once, with the mean of its scores', () => {
    const designs = matrixFromRows([
      [30, 0, 0],
      [40, 0, 0],
      [30, 0, 0],
    ]);
    const scores = Float64Array.of(5, 4, 1);
    const proposal = repeatBest.propose({ ...offer, designs, scores, batchSize: 2 }, {});
    expect(proposal).toEqual({
      designs: matrixFromRows([
        [40, 0, 0],
        [30, 0, 0],
      ]),
      believed: Float64Array.of(4, 3),
    });
  });
});
