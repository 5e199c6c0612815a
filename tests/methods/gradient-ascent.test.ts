import { expect, test } from 'vitest';
import { gradientAscent } from '../../methods/gradient-ascent.js';
import { describeMethodContract } from './contract.js';
import { liftOf, makeLowerHalf, quickNetwork } from './quick-networks.js';

describeMethodContract(gradientAscent, {
  settings: { surrogate: quickNetwork, search: { steps: 4, traceEvery: 2 } },
});

test.each([1, 2, 3, 4])(
  'gradientAscent.propose(offer) beats the best visible design of an easy truth under a ceiling, seed %i',
  async (seed) => {
    const settings = { surrogate: { width: 16, learningRate: 0.01, steps: 150 } };
    expect(await liftOf(gradientAscent, settings, makeLowerHalf('continuous', seed))).toBeGreaterThan(0);
  },
);
