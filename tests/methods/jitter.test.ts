import { describe, expect, test } from 'vitest';
import { countDistinctRows, matrixFromRows, rowKey, rowView } from '../../harness/designs.js';
import type { Offer, Proposal } from '../../harness/method.js';
import { makeSpace } from '../../harness/space.js';
import { jitter } from '../../methods/jitter.js';
import { describeMethodContract, makeOffer } from './contract.js';

describeMethodContract(jitter);

const propose = (offer: Offer, settings: Record<string, unknown> = {}): Proposal =>
  jitter.propose(offer, jitter.settings.parse(settings)) as Proposal;

describe('jitter.propose(offer, settings)', () => {
  test.each(['continuous', 'mixed', 'sequence', 'few rows', 'duplicate rows'] as const)(
    'proposes different designs, none of which is in the table: %s',
    (kind) => {
      const offer = makeOffer(kind, { batchSize: 32 });
      const { designs } = propose(offer);
      const visible = new Set(Array.from({ length: offer.designs.rows }, (_, i) => rowKey(offer.designs, i)));
      expect(countDistinctRows(designs)).toBe(32);
      expect(Array.from({ length: 32 }, (_, i) => visible.has(rowKey(designs, i)))).not.toContain(true);
    },
  );

  test('changes the best visible design only, with one parent, and by the step asked for', () => {
    const offer = makeOffer('continuous', { batchSize: 400 });
    const best = offer.scores.indexOf(Math.max(...offer.scores));
    const parent = rowView(offer.designs, best);
    const { designs } = propose(offer, { parents: 1, step: 0.001, changes: 3 });
    const shares = Array.from({ length: 400 }, (_, i) => (rowView(designs, i)[0]! - parent[0]!) / 70);
    const deviation = Math.sqrt(shares.reduce((sum, share) => sum + share * share, 0) / 400);
    // The standard error of a deviation from 400 normal draws is 0.001 / √800; five of them.
    expect(Math.abs(deviation - 0.001)).toBeLessThan((5 * 0.001) / Math.sqrt(800));
  });

  test('changes as many sites of a sequence on average as asked for', () => {
    const letters = ['A', 'C', 'G', 'T'];
    const space = makeSpace(
      Array.from({ length: 50 }, (_, j) => ({ kind: 'category', name: `${j}`, levels: letters })),
    );
    const offer: Offer = {
      ...makeOffer('sequence', { batchSize: 500 }),
      space,
      designs: matrixFromRows([new Float64Array(50)]),
      scores: Float64Array.of(1),
    };
    const { designs } = propose(offer, { changes: 5 });
    const changed = designs.values.reduce((count, level) => count + (level === 0 ? 0 : 1), 0) / 500;
    // Binomial(50, 0.1) has variance 4.5; five standard errors of a mean of 500.
    expect(Math.abs(changed - 5)).toBeLessThan(5 * Math.sqrt(4.5 / 500));
  });

  test('repeats designs rather than fail when the whole space is measured', () => {
    const space = makeSpace([{ kind: 'integer', name: 'switch', low: 0, high: 1 }]);
    const offer = { ...makeOffer('mixed'), space, designs: matrixFromRows([[0], [1]]) };
    expect(propose({ ...offer, scores: Float64Array.of(1, 2) }).designs.rows).toBe(offer.batchSize);
  });
});
