import { expect, test } from 'vitest';
import { ensembleAscent } from '../../methods/ensemble-ascent.js';
import { describeMethodContract, makeOffer } from './contract.js';
import { quickEnsemble } from './quick-networks.js';

describeMethodContract(ensembleAscent, {
  settings: { surrogate: quickEnsemble, search: { steps: 4, traceEvery: 2 } },
});

test('ensembleAscent.propose(offer) ends where members agree the more, the more spreads it takes off', async () => {
  const spreadWith = async (spreads: number, seed: number) => {
    const settings = ensembleAscent.settings.parse({
      surrogate: { width: 16, steps: 60, members: 4, learningRate: 0.01 },
      search: { steps: 40 },
      caution: { spreads },
    });
    const { spread } = await ensembleAscent.propose(makeOffer('continuous', { seed, rows: 15 }), settings);
    return spread!.reduce((sum, sd) => sum + sd, 0) / spread!.length;
  };
  for (let seed = 1; seed <= 4; seed++) {
    expect(await spreadWith(5, seed), `seed ${seed}`).toBeLessThan(await spreadWith(0, seed));
  }
});
