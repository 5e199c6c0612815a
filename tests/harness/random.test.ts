import { describe, expect, test } from 'vitest';
import { openStream, rootStream, type Stream, sampleWithout, shuffleInPlace } from '../../harness/random.js';
import reference from '../reference/statistics.json' with { type: 'json' };
import { criticalDeviation, misfit, tally } from './chi-square.js';

const draws = (stream: Stream, count: number) => Array.from({ length: count }, () => stream.uniform());

/** Mean product of two samples in units of its standard error, for samples of mean 0 and variance 1. */
function correlationDeviation(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, x, i) => sum + x * b[i]!, 0) / Math.sqrt(a.length);
}

/** Uniform numbers brought to mean 0 and variance 1. */
const standardize = (values: readonly number[]) => values.map((u) => (u - 0.5) * Math.sqrt(12));

describe('a stream is fixed by its path alone', () => {
  test('rootStream(seed) gives the same numbers for the same seed and others for another', () => {
    expect(draws(rootStream(7), 20)).toEqual(draws(rootStream(7), 20));
    expect(draws(rootStream(7), 20)).not.toEqual(draws(rootStream(8), 20));
  });

  test('openStream(stream.path) starts the stream again, however far it had gone', () => {
    const stream = rootStream(3).split('task', 4);
    const first = draws(stream, 10);
    stream.normal();
    expect(draws(openStream(stream.path), 10)).toEqual(first);
    expect(openStream(stream.path).split('child').path).toBe(stream.split('child').path);
  });

  test('split(name) does not depend on draws or on other children, nor changes its parent', () => {
    const plain = rootStream(1);
    const expected = { child: draws(plain.split('a'), 10), parent: draws(plain, 10) };
    const busy = rootStream(1);
    busy.split('b').normal();
    const child = draws(busy.split('a'), 10);
    expect({ child, parent: draws(busy, 10) }).toEqual(expected);
    busy.below(6);
    expect(draws(busy.split('a'), 10)).toEqual(expected.child);
  });

  test('split(a, b) is split(a).split(b)', () => {
    expect(rootStream(1).split('a', 2).path).toBe(rootStream(1).split('a').split(2).path);
  });

  test('split(…) gives another stream for every other name, and none that equals its parent', () => {
    const root = rootStream(1);
    const children = [
      root,
      rootStream(2),
      root.split('a'),
      root.split('b'),
      root.split('a', 'b'),
      root.split('ab'),
      root.split('a,b'),
      root.split('a","b'),
      root.split('1'),
      root.split(1),
      root.split(1.5),
      root.split(''),
    ];
    expect(new Set(children.map((stream) => stream.uniform())).size).toBe(children.length);
  });

  test('first numbers of 20,000 siblings are uniform, and uncorrelated from one sibling to the next', () => {
    const root = rootStream(5);
    const firsts = Array.from({ length: 20_000 }, (_, i) => root.split('seed', i).uniform());
    let next = 0;
    expect(misfit(tally(100, firsts.length, () => Math.floor(firsts[next++]! * 100)))).toBeLessThan(1);
    const centred = standardize(firsts);
    const deviation = correlationDeviation(centred.slice(1), centred.slice(0, -1));
    expect(Math.abs(deviation)).toBeLessThan(criticalDeviation);
  });

  test('two siblings run side by side without correlation', () => {
    const [a, b] = [rootStream(5).split('a'), rootStream(5).split('b')];
    const deviation = correlationDeviation(standardize(draws(a, 50_000)), standardize(draws(b, 50_000)));
    expect(Math.abs(deviation)).toBeLessThan(criticalDeviation);
  });
});

describe('uniform()', () => {
  test('lies in [0, 1) and fills 100 bins evenly', () => {
    const values = draws(rootStream(11), 100_000);
    expect(values.every((u) => u >= 0 && u < 1)).toBe(true);
    let next = 0;
    expect(misfit(tally(100, values.length, () => Math.floor(values[next++]! * 100)))).toBeLessThan(1);
  });

  test('fills the square evenly with pairs of consecutive numbers', () => {
    const stream = rootStream(12);
    const cell = () => Math.floor(stream.uniform() * 10) * 10 + Math.floor(stream.uniform() * 10);
    expect(misfit(tally(100, 50_000, cell))).toBeLessThan(1);
  });

  test('uses all 53 bits: its last 3 bits are even too', () => {
    const stream = rootStream(13);
    const lastBits = () => Number(BigInt(stream.uniform() * 2 ** 53) & 7n);
    expect(misfit(tally(8, 40_000, lastBits))).toBeLessThan(1);
  });
});

describe('below(limit)', () => {
  test.each([3, 10, 20, 100])('below(%i) gives each number equally often', (limit) => {
    const stream = rootStream(21).split(limit);
    expect(misfit(tally(limit, 50_000, () => stream.below(limit)))).toBeLessThan(1);
  });

  test.each([3 * 2 ** 30, 3 * 2 ** 33])(
    'below(%d) is unbiased where the remainder of 32 bits would not be',
    (limit) => {
      const stream = rootStream(22).split(limit);
      expect(misfit(tally(3, 30_000, () => Math.floor((stream.below(limit) / limit) * 3)))).toBeLessThan(1);
    },
  );

  test('below(1) is 0', () => {
    expect(rootStream(1).below(1)).toBe(0);
  });
});

describe('normal()', () => {
  const stream = rootStream(31);
  const values = Array.from({ length: 100_000 }, () => stream.normal());
  const n = values.length;
  const moment = (k: number) => values.reduce((sum, z) => sum + z ** k, 0) / n;

  // Moments 1 … 4 of a standard normal are 0, 1, 0, 3; the k-th sample moment has variance (m2k − mk²) / n with
  // m2 … m8 = 1, 3, 15, 105.
  test.each([
    [1, 0, 1],
    [2, 1, 3 - 1],
    [3, 0, 15],
    [4, 3, 105 - 9],
  ])('has moment %i equal to %i within sampling error', (k, expected, variance) => {
    expect(Math.abs(moment(k) - expected)).toBeLessThan(criticalDeviation * Math.sqrt(variance / n));
  });

  test('falls between published quantiles as often as it should', () => {
    const quantiles = Object.entries(reference.student_t.normal_quantiles)
      .map(([p, z]) => ({ p: Number(p), z }))
      .sort((a, b) => a.p - b.p);
    const edges = [0, ...quantiles.map(({ p }) => p), 1];
    const shares = edges.slice(1).map((p, i) => p - edges[i]!);
    let next = 0;
    const cell = () => {
      const value = values[next++]!;
      return quantiles.filter(({ z }) => z <= value).length;
    };
    expect(misfit(tally(shares.length, n, cell), shares)).toBeLessThan(1);
  });

  test('gives consecutive numbers without correlation, in size too', () => {
    const deviations = [(z: number) => z, (z: number) => (z * z - 1) / Math.SQRT2].map((shape) => {
      const shaped = values.map(shape);
      return correlationDeviation(shaped.slice(1), shaped.slice(0, -1));
    });
    for (const deviation of deviations) expect(Math.abs(deviation)).toBeLessThan(criticalDeviation);
  });
});

describe('sampleWithout(stream, limit, count)', () => {
  test('gives different numbers from 0 … limit − 1, all of them when count reaches limit', () => {
    const stream = rootStream(41);
    for (let count = 0; count <= 12; count++) {
      const drawn = sampleWithout(stream, 9, count);
      expect(drawn).toHaveLength(Math.min(9, count));
      expect(new Set(drawn).size).toBe(drawn.length);
      expect(drawn.every((k) => Number.isInteger(k) && k >= 0 && k < 9)).toBe(true);
    }
  });

  test('gives every ordered pair of 4 equally often', () => {
    const stream = rootStream(42);
    const pairs = [0, 1, 2, 3].flatMap((a) => [0, 1, 2, 3].filter((b) => b !== a).map((b) => `${a}${b}`));
    const draw = () => pairs.indexOf(sampleWithout(stream, 4, 2).join(''));
    expect(misfit(tally(pairs.length, 24_000, draw))).toBeLessThan(1);
  });
});

describe('shuffleInPlace(values, stream)', () => {
  test('gives every order of 4 equally often', () => {
    const stream = rootStream(51);
    const orders: string[] = [];
    const counts = tally(24, 24_000, () => {
      const order = shuffleInPlace(Uint8Array.of(0, 1, 2, 3), stream).join('');
      if (!orders.includes(order)) orders.push(order);
      return orders.indexOf(order);
    });
    expect(orders).toHaveLength(24);
    expect(misfit(counts)).toBeLessThan(1);
  });

  test('gives the same order for the same stream, in the array it was given', () => {
    const values = [5, 1, 4, 1, 3];
    expect(shuffleInPlace(values, rootStream(52))).toBe(values);
    const shuffled = () => shuffleInPlace([5, 1, 4, 1, 3], rootStream(52));
    expect(shuffled()).toEqual(shuffled());
    expect(shuffled().sort()).toEqual([1, 1, 3, 4, 5]);
  });
});
