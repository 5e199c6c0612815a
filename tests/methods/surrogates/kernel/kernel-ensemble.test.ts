import { beforeAll, describe, expect, test } from 'vitest';
import { rootStream } from '../../../../harness/random.js';
import { kernelEnsemble } from '../../../../methods/surrogates/kernel/kernel-ensemble.js';
import { kernelNetwork } from '../../../../methods/surrogates/kernel/kernel-network.js';
import { useBackend } from '../../../../methods/surrogates/network/backend.js';
import { modelOfEnsemble } from '../../../../methods/surrogates/network/ensemble.js';
import { freshParameters } from '../../../../methods/surrogates/network/parameters.js';
import { expectClose } from '../network/expect-close.js';
import { encoding, relaxedRows } from '../network/random-network.js';
import { keptParameters } from './kernel-passes.js';

beforeAll(() => useBackend('kernel'));

const scaling = { mean: 40.1, deviation: 8.3 };

describe.each([2, 5])('kernelEnsemble(encoding, members, scaling) of %i networks', (count) => {
  const members = Array.from({ length: count }, (_, m) =>
    keptParameters(freshParameters(encoding.width, [9, 5], rootStream(m))),
  );
  const together = kernelEnsemble(encoding, members, scaling);
  const apart = modelOfEnsemble(members.map((member) => kernelNetwork(encoding, member, scaling)));

  test.each([1, 7, 300])('predicts %i rows as its networks do one by one', (rows) => {
    const x = relaxedRows(rows);
    expect(together.predict(x)).toEqual(apart.predict(x));
  });

  test.each([0, 1.5])('has their gradient of mean − %d · spread', (spreadWeight) => {
    const x = relaxedRows(150);
    const expected = apart.gradient!(x, spreadWeight);
    expectClose(together.gradient!(x, spreadWeight).values, expected.values, 1e-11);
  });
});

test('kernelEnsemble(…) of networks that agree has no spread, and the gradient of one', () => {
  const member = keptParameters(freshParameters(encoding.width, [9, 5], rootStream(1)));
  const agreeing = kernelEnsemble(encoding, [member, member, member], scaling);
  const x = relaxedRows(20);
  expect(agreeing.predict(x).spread!.every((spread) => spread === 0)).toBe(true);
  const alone = kernelNetwork(encoding, member, scaling).predictWithGradient(x).gradient;
  expectClose(agreeing.gradient!(x, 10).values, alone.values, 1e-12);
});
