import { describe, expect, test } from 'vitest';
import { countDistinctRows, takeRows } from '../../harness/designs.js';
import { rootStream } from '../../harness/random.js';
import { makeSpace, sampleUniform } from '../../harness/space.js';
import { gaussianProcess } from '../../methods/gaussian-process.js';
import { describeMethodContract, makeOffer, toyTruth } from './contract.js';

const quick = { starts: 1, iterations: 10, candidates: 100, frequencies: 64, rounds: 4 };
const propose = async (offer: Parameters<typeof gaussianProcess.propose>[0], settings: object) =>
  gaussianProcess.propose(offer, gaussianProcess.settings.parse({ ...quick, ...settings }));

const ways = ['thompson', 'upper-bound'] as const;
describe.each(ways)('with batch %s', (batch) => {
  describeMethodContract(gaussianProcess, { settings: { ...quick, batch } });

  test('beats the best visible design of a smooth truth under a ceiling, over four seeds', async () => {
    for (let seed = 0; seed < 4; seed++) {
      const whole = makeOffer('continuous', { rows: 80, seed });
      const truth = toyTruth(whole.space, whole.designs);
      const lower = [...truth.keys()].sort((a, b) => truth[a]! - truth[b]!).slice(0, 40);
      const designs = takeRows(whole.designs, lower);
      const scores = Float64Array.from(lower, (i) => whole.scores[i]!);
      const proposal = await propose({ ...whole, designs, scores }, { batch });
      const best = Math.max(...toyTruth(whole.space, proposal.designs));
      expect(best, `seed ${seed}`).toBeGreaterThan(Math.max(...toyTruth(whole.space, designs)));
    }
  });

  test('proposes different designs as long as its candidates are different, then repeats', async () => {
    const space = makeSpace([
      { kind: 'category', name: 'a', levels: ['x', 'y', 'z'] },
      { kind: 'integer', name: 'b', low: 0, high: 1 },
    ]);
    const designs = sampleUniform(space, 8, rootStream(1));
    const scores = toyTruth(space, designs);
    for (const batchSize of [6, 9]) {
      const offer = { space, designs, scores, batchSize, stream: rootStream(2), budgetSeconds: 60 };
      const proposal = await propose(offer, { batch });
      expect(proposal.designs.rows).toBe(batchSize);
      expect(countDistinctRows(proposal.designs)).toBe(6);
    }
  });

  test('works on constant scores and on 500 columns', async () => {
    const space = makeSpace(
      Array.from({ length: 500 }, (_, j) => ({
        kind: 'continuous' as const,
        name: `c${j}`,
        low: 0,
        high: 1,
      })),
    );
    const designs = sampleUniform(space, 10, rootStream(1));
    const scores = new Float64Array(10).fill(4);
    const offer = { space, designs, scores, batchSize: 3, stream: rootStream(2), budgetSeconds: 60 };
    const { believed } = await propose(offer, { batch, rounds: 1, steps: 3 });
    for (const value of believed!) expect(value).toBeCloseTo(4, 6);
  });
});

test('upper-bound with kappa 0 spreads less than with kappa 3: believing shrinks only what is unsure', async () => {
  const offer = makeOffer('continuous', { rows: 15 });
  const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const greedy = await propose(offer, { batch: 'upper-bound', kappa: 0 });
  const bold = await propose(offer, { batch: 'upper-bound', kappa: 3 });
  expect(mean(greedy.spread!)).toBeLessThan(mean(bold.spread!));
  expect(mean(greedy.believed!)).toBeGreaterThan(mean(bold.believed!));
});
