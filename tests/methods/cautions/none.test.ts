import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { noCaution } from '../../../methods/cautions/none.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer } from '../contract.js';
import { type StubAbilities, stubModel, stubSurrogate } from '../stub-parts.js';

const table = makeTable(makeOffer('mixed'));
const prepare = (abilities: StubAbilities) =>
  noCaution.prepare(stubSurrogate(abilities), {}, table, {}, rootStream(1));

describe('noCaution.prepare(surrogate, …)', () => {
  test('climbs the mean and its gradient, spread or not', async () => {
    for (const spread of [true, false]) {
      const objective = await prepare({ spread });
      const model = stubModel({ spread });
      expect(objective.value(table.x)).toEqual(model.predict(table.x).mean);
      expect(objective.gradient!(table.x)).toEqual(model.gradient!(table.x, 0));
      expect(objective.believe(table.x)).toEqual(model.predict(table.x));
    }
  });

  test('has no gradient where the model has none', async () => {
    expect(await prepare({ gradient: false })).not.toHaveProperty('gradient');
  });
});
