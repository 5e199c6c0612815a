import { describe, expect, test } from 'vitest';
import { genetic } from '../../methods/genetic.js';
import { describeMethodContract } from './contract.js';
import { liftOf, makeLowerHalf, quickEnsemble } from './quick-networks.js';

describeMethodContract(genetic, {
  settings: { surrogate: quickEnsemble, search: { generations: 3, traceEvery: 2 } },
});

describe.each([1, 2, 3, 4])('genetic.propose(offer) under a ceiling, seed %i', (seed) => {
  const settings = genetic.settings.parse({
    surrogate: { width: 16, members: 2, learningRate: 0.01, steps: 100 },
    search: { generations: 20 },
  });

  test('beats the best visible design of an easy truth', async () => {
    expect(await liftOf(genetic, settings, makeLowerHalf('mixed', seed))).toBeGreaterThan(0);
  });

  test('proposes designs that the ensemble rates higher than it rates the best visible ones', async () => {
    const { believed, trace } = await genetic.propose(makeLowerHalf('mixed', seed), settings);
    expect(Math.max(...believed!)).toBeGreaterThan(Math.max(...trace![0]!.believed));
  });
});
