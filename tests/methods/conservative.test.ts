import { describe, expect, test } from 'vitest';
import { conservative } from '../../methods/conservative.js';
import { describeMethodContract } from './contract.js';
import { quickNetwork } from './quick-networks.js';

describe.each([true, false])('with adjust %s', (adjust) => {
  describeMethodContract(conservative, {
    settings: {
      surrogate: quickNetwork,
      search: { steps: 4, traceEvery: 2 },
      caution: { adjust, steps: 2, rows: 4 },
    },
  });
});

test('conservative climbs by default as many steps of the same size as it mines in training (ICML 2021)', () => {
  const { search, caution } = conservative.settings.parse({}) as Record<string, Record<string, unknown>>;
  expect([search!['steps'], search!['stepSize']]).toEqual([caution!['steps'], caution!['stepSize']]);
});
