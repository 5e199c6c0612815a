import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { conservativeTraining } from '../../../methods/cautions/conservative-training.js';
import { ridgeSurrogate } from '../../../methods/surrogates/ridge.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer } from '../contract.js';
import { stubModel, stubSurrogate } from '../stub-parts.js';

const table = makeTable(makeOffer('mixed'));
const chosen = { weight: 0.5, target: 1.5, rows: 4, steps: 7, stepSize: 0.2 };

describe('conservativeTraining.prepare(surrogate, …)', () => {
  test('fits conservatively with the settings chosen, with a target only where the weight is adjusted', async () => {
    const surrogate = stubSurrogate({ conservative: true });
    for (const adjust of [true, false]) {
      const settings = conservativeTraining.settings.parse({ ...chosen, adjust });
      const own = { depth: 2 };
      const objective = await conservativeTraining.prepare(surrogate, own, table, settings, rootStream(1));
      const { target, ...fixed } = chosen;
      expect(surrogate.fits.at(-1)).toMatchObject({ settings: own });
      expect(surrogate.fits.at(-1)!.conservatism).toEqual(adjust ? { ...fixed, target } : fixed);
      expect(objective.value(table.x)).toEqual(stubModel().predict(table.x).mean);
      expect(objective.gradient!(table.x)).toEqual(stubModel().gradient!(table.x, 0));
    }
  });

  test('refuses a surrogate that can’t be trained so with "method-cannot", naming it', async () => {
    const settings = conservativeTraining.settings.parse({});
    const ridge = ridgeSurrogate.settings.parse({});
    await expect(
      conservativeTraining.prepare(ridgeSurrogate, ridge, table, settings, rootStream(1)),
    ).rejects.toMatchObject({
      name: 'OnebatchError',
      code: 'method-cannot',
      message: expect.stringContaining('"ridge"'),
    });
  });
});
