import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { lowerBound } from '../../../methods/cautions/lower-bound.js';
import { networkSurrogate } from '../../../methods/surrogates/network-surrogates.js';
import { makeTable } from '../../../methods/table.js';
import { makeOffer } from '../contract.js';
import { type StubAbilities, stubModel, stubSurrogate } from '../stub-parts.js';

const table = makeTable(makeOffer('mixed'));
const prepare = (abilities: StubAbilities, spreads: number) =>
  lowerBound.prepare(stubSurrogate(abilities), {}, table, { spreads }, rootStream(1));

describe('lowerBound.prepare(surrogate, …, { spreads })', () => {
  test('climbs mean − spreads · spread and its gradient, and still believes the mean', async () => {
    const objective = await prepare({}, 3);
    // The stub's mean is 10 times its first feature, its spread the feature itself: 10 − 3 = 7 times.
    const first = Float64Array.from({ length: table.x.rows }, (_, i) => table.x.values[i * table.x.columns]!);
    objective.value(table.x).forEach((value, i) => {
      expect(value).toBeCloseTo(7 * first[i]!, 12);
    });
    expect(objective.gradient!(table.x).values[0]).toBe(7);
    expect(objective.believe(table.x)).toEqual(stubModel().predict(table.x));
  });

  test('with 0 spreads climbs the mean', async () => {
    const objective = await prepare({}, 0);
    expect(objective.value(table.x)).toEqual(stubModel().predict(table.x).mean);
  });

  test('has no gradient where the model has none', async () => {
    expect(await prepare({ gradient: false }, 1)).not.toHaveProperty('gradient');
  });

  test('refuses a surrogate without a spread with "method-cannot", before anything is climbed', async () => {
    const failure = { name: 'OnebatchError', code: 'method-cannot' };
    await expect(prepare({ spread: false }, 1)).rejects.toMatchObject(failure);
    const settings = networkSurrogate.settings.parse({ width: 2, layers: 1, steps: 1 });
    await expect(
      lowerBound.prepare(networkSurrogate, settings, table, { spreads: 1 }, rootStream(1)),
    ).rejects.toMatchObject({ ...failure, message: expect.stringContaining('"network" has none') });
  });
});
