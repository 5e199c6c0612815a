import { describe, expect, test } from 'vitest';
import { countDistinctRows, takeRows } from '../../harness/designs.js';
import { rootStream } from '../../harness/random.js';
import { makeSpace, type Space, sampleUniform, sequenceSpace } from '../../harness/space.js';
import { additive } from '../../methods/additive.js';
import { describeMethodContract, makeOffer, toyTruth } from './contract.js';

const propose = async (offer: Parameters<typeof additive.propose>[0], settings: object = {}) =>
  additive.propose(offer, additive.settings.parse(settings));

describeMethodContract(additive);
describe('with pairwise', () => describeMethodContract(additive, { settings: { pairwise: true } }));

/** The lower half of 200 uniform designs by true score: a ceiling. */
function underCeiling(space: Space, seed: number) {
  const stream = rootStream(seed);
  const drawn = sampleUniform(space, 200, stream.split('pool'));
  const scores = toyTruth(space, drawn);
  const order = Array.from({ length: 200 }, (_, i) => i).sort((a, b) => scores[a]! - scores[b]!);
  const designs = takeRows(drawn, order.slice(0, 100));
  const noise = stream.split('noise');
  const measured = toyTruth(space, designs).map((score) => score + 0.05 * noise.normal());
  const offer = {
    space,
    designs,
    scores: measured,
    batchSize: 10,
    stream: stream.split('m'),
    budgetSeconds: 60,
  };
  return { offer, bestVisible: Math.max(...toyTruth(space, designs)) };
}

describe('additive.propose(offer, settings)', () => {
  test.each([
    ['sequences', sequenceSpace(8, ['A', 'C', 'G', 'T']), 0],
    // its whole numbers miss 0.3 of their range: cycles 4 of 1 to 12, and wash 0 of 0 to 1
    ['a mixed space', makeOffer('mixed').space, -((3 / 11 - 0.3) ** 2) - 0.3 ** 2],
  ])(
    'beats the best visible design on an additive truth under a ceiling, over ten seeds of %s',
    async (_, space, optimum) => {
      for (let seed = 0; seed < 10; seed++) {
        const { offer, bestVisible } = underCeiling(space, seed);
        const { designs } = await propose(offer);
        const best = Math.max(...toyTruth(space, designs));
        expect(best, `seed ${seed}`).toBeGreaterThan(bestVisible);
        expect(best, `seed ${seed}`).toBeGreaterThan(optimum - 0.05);
      }
    },
  );

  test('puts the fitted maximizer first: no design of the batch is believed better', async () => {
    for (const kind of ['continuous', 'mixed', 'sequence'] as const) {
      const { believed } = await propose(makeOffer(kind));
      for (const value of believed!) expect(value).toBeLessThanOrEqual(believed![0]! + 1e-9);
    }
  });

  test('proposes different designs as long as the space has them, then repeats', async () => {
    const space = makeSpace([
      { kind: 'category', name: 'a', levels: ['x', 'y', 'z'] },
      { kind: 'integer', name: 'b', low: 0, high: 2 },
    ]);
    const designs = sampleUniform(space, 10, rootStream(1));
    const scores = toyTruth(space, designs);
    for (const batchSize of [9, 12]) {
      const proposal = await propose({
        space,
        designs,
        scores,
        batchSize,
        stream: rootStream(2),
        budgetSeconds: 60,
      });
      expect(proposal.designs.rows).toBe(batchSize);
      expect(countDistinctRows(proposal.designs)).toBe(9);
    }
  });

  test('works on 2,000 columns and on constant scores', async () => {
    const space = makeSpace(
      Array.from({ length: 2000 }, (_, j) => ({
        kind: 'continuous' as const,
        name: `c${j}`,
        low: 0,
        high: 1,
      })),
    );
    const designs = sampleUniform(space, 10, rootStream(1));
    for (const scores of [toyTruth(space, designs), new Float64Array(10).fill(2)]) {
      const { believed } = await propose({
        space,
        designs,
        scores,
        batchSize: 4,
        stream: rootStream(2),
        budgetSeconds: 60,
      });
      expect(believed!.every(Number.isFinite)).toBe(true);
    }
  });
});
