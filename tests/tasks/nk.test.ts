import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows, rowView } from '../../harness/designs.js';
import { OnebatchError } from '../../harness/errors.js';
import { rootStream } from '../../harness/random.js';
import { sampleUniform } from '../../harness/space.js';
import type { Task } from '../../harness/task.js';
import { nk, nkTask } from '../../tasks/nk.js';
import reference from '../reference/combinatorial.json' with { type: 'json' };
import { describeTaskContract } from './contract.js';
import { everySequence, interactingPairs, largest, scoreOf, summarize } from './sequences.js';

type Settings = Parameters<typeof nk.settings.parse>[0];

const make = (settings: Settings, seed: number): Task =>
  nk.make(nk.settings.parse(settings), rootStream(seed).split('nk test'));

const bits = (text: string): number[] => [...text].map(Number);

/** Sequences over two letters that are higher than all sequences one change away, as texts. */
function localMaxima(task: Task): string[] {
  const length = task.space.columns.length;
  const scores = task.truth(everySequence(length, 2));
  const found: string[] = [];
  scores.forEach((score, code) => {
    const isMaximum = Array.from({ length }, (_, site) => scores[code ^ (1 << site)]!).every(
      (y) => y < score,
    );
    if (isMaximum) found.push(code.toString(2).padStart(length, '0'));
  });
  return found;
}

/** The values of a fact in the reference file, found by its first words. */
function factValues(opening: string): Record<string, number>[] {
  return reference.nk_facts.find(({ fact }) => fact.startsWith(opening))!.values as unknown as Record<
    string,
    number
  >[];
}

describeTaskContract(
  'nk',
  nk,
  [
    {},
    { length: 2, interactions: 0, alphabet: 20 },
    { length: 10, interactions: 9, alphabet: 2 },
    { length: 24, interactions: 3, alphabet: 2, neighbourhood: 'random' },
  ],
  { instances: 3 },
);

// Instances with all tables written out, enumerated with numpy: tests/reference/combinatorial.json, nk_instances.
describe.each(reference.nk_instances)('nkTask(landscape) on the reference instance $id', (instance) => {
  const { neighbours, tables, N } = instance;
  const task = nkTask({ neighbours, tables, letters: ['0', '1'] }, rootStream(1));
  const all = everySequence(N, 2);
  const scores = task.truth(all);

  test('scores the listed sequences', () => {
    const alternating = Array.from({ length: N }, (_, i) => i % 2);
    expect(scoreOf(task, new Float64Array(N))).toBeCloseTo(instance.f_all_zeros, 12);
    expect(scoreOf(task, new Float64Array(N).fill(1))).toBeCloseTo(instance.f_all_ones, 12);
    expect(scoreOf(task, alternating)).toBeCloseTo(instance.f_alternating_0101, 12);
    expect(scoreOf(task, bits(instance.argmin))).toBeCloseTo(instance.min, 12);
    expect(scoreOf(task, bits(instance.second_argmax))).toBeCloseTo(instance.second_best, 12);
    instance.all_values_in_counting_order?.forEach((value, code) => {
      expect(scores[code]).toBeCloseTo(value, 12);
    });
  });

  test('has the listed mean and standard deviation over all sequences', () => {
    const { mean, variance } = summarize(Array.from(scores));
    expect(mean).toBeCloseTo(instance.mean_over_all, 12);
    const populationVariance = (variance * (scores.length - 1)) / scores.length;
    expect(Math.sqrt(populationVariance)).toBeCloseTo(instance.population_sd_over_all, 12);
  });

  test('knows the listed optimum exactly', () => {
    expect(task.optimum.known).toBe('exact');
    expect(task.optimum.value).toBeCloseTo(instance.max, 12);
    expect(Array.from(task.optimum.design!)).toEqual(bits(instance.argmax));
  });

  test('has exactly the listed local maxima', () => {
    expect(localMaxima(task).sort()).toEqual(instance.local_maxima);
  });
});

describe('nk landscapes over seeds', () => {
  const seeds = Array.from({ length: 150 }, (_, i) => i + 1);

  // Kauffman & Levin 1987: 2^N / (N + 1).
  test.each(factValues('K=N-1: probability').filter(({ N }) => N === 5 || N === 8))(
    'with K = N − 1 = $N − 1 have $expected_local_maxima local maxima on average',
    ({ N, expected_local_maxima }) => {
      const counts = seeds.map(
        (seed) => localMaxima(make({ length: N!, interactions: N! - 1, alphabet: 2 }, seed)).length,
      );
      const { mean, standardError } = summarize(counts);
      expect(Math.abs(mean - expected_local_maxima!)).toBeLessThan(4 * standardError);
    },
  );

  // K = N − 1 makes all 2^N fitnesses independent means of N uniforms: expected maximum by quadrature (scipy 1.10.1).
  test.each(factValues('K=N-1: fitnesses').filter(({ N }) => N === 4 || N === 8))(
    'with K = N − 1 = $N − 1 have the optimum $expected_global_max on average',
    ({ N, expected_global_max }) => {
      const tops = seeds.map(
        (seed) => make({ length: N!, interactions: N! - 1, alphabet: 2 }, seed).optimum.value,
      );
      const { mean, standardError } = summarize(tops);
      expect(Math.abs(mean - expected_global_max!)).toBeLessThan(4 * standardError);
    },
  );

  // Monte Carlo over 4000 landscapes with numpy; the difference of two means has the root of both squared errors.
  test.each(factValues('Monte Carlo over 4000').filter(({ K }) => K! > 0))(
    'with random neighbours, N = $N and K = $K agree with numpy in local maxima and optimum',
    ({ N, K, mean_global_max, se_global_max, mean_n_local_maxima, se_n_local_maxima }) => {
      const tasks = seeds.map((seed) =>
        make({ length: N!, interactions: K!, alphabet: 2, neighbourhood: 'random' }, seed),
      );
      const tops = summarize(tasks.map((task) => task.optimum.value));
      const counts = summarize(tasks.map((task) => localMaxima(task).length));
      expect(Math.abs(tops.mean - mean_global_max!)).toBeLessThan(
        4 * Math.hypot(tops.standardError, se_global_max!),
      );
      expect(Math.abs(counts.mean - mean_n_local_maxima!)).toBeLessThan(
        4 * Math.hypot(counts.standardError, se_n_local_maxima!),
      );
    },
  );

  test('with K = 0 have one local maximum, the optimum', () => {
    for (const seed of seeds.slice(0, 50)) {
      const task = make({ length: 8, interactions: 0, alphabet: 2 }, seed);
      expect(localMaxima(task)).toEqual([Array.from(task.optimum.design!).join('')]);
    }
  });

  // Weinberger 1990: autocorrelation of a walk after one step is 1 − (K + 1)/N; longer lags by the exact ensemble form
  // of the reference file, r(s) = 2^−(K+1) Σ C(K+1, j) (1 − 2j/N)^s.
  test.each(
    factValues('Exact ensemble walk').flatMap((value) =>
      ['adjacent', 'random'].map((neighbourhood) => ({ ...value, neighbourhood })),
    ) as unknown as { N: number; K: number; r: number[]; neighbourhood: string }[],
  )('with N = $N, K = $K, $neighbourhood: scores along a random walk correlate as known', (value) => {
    const { N, K, r, neighbourhood } = value;
    expect(r[1]).toBeCloseTo(1 - (K + 1) / N, 12);
    const steps = 80;
    // A uniform score has mean 1/2, and the mean of N of them variance 1/(12 N), over landscapes.
    const products = r.map(() => [] as number[]);
    for (const seed of seeds) {
      const task = make({ length: N, interactions: K, alphabet: 2, neighbourhood }, seed);
      const stream = rootStream(seed).split('walk');
      let row = Float64Array.from(sampleUniform(task.space, 1, stream).values);
      const walk = Array.from({ length: steps }, () => {
        const site = stream.below(N);
        row = row.with(site, 1 - row[site]!);
        return row;
      });
      const scores = task.truth(matrixFromRows(walk)).map((score) => (score - 0.5) * Math.sqrt(12 * N));
      r.forEach((_, lag) => {
        const pairs = steps - lag;
        let total = 0;
        for (let k = 0; k < pairs; k++) total += scores[k]! * scores[k + lag]!;
        products[lag]!.push(total / pairs);
      });
    }
    r.forEach((expected, lag) => {
      const { mean, standardError } = summarize(products[lag]!);
      expect(Math.abs(mean - expected), `lag ${lag}`).toBeLessThan(4 * standardError);
    });
  });
});

describe('nk.make(settings, stream)', () => {
  test('finds the exact optimum that trying every sequence finds', () => {
    const settings = fc
      .tuple(fc.integer({ min: 2, max: 6 }), fc.nat(5), fc.integer({ min: 2, max: 4 }), fc.boolean())
      .map(([length, interactions, alphabet, adjacent]) => ({
        length,
        interactions: Math.min(interactions, length - 1),
        alphabet,
        neighbourhood: adjacent ? 'adjacent' : 'random',
      }));
    fc.assert(
      fc.property(settings, fc.nat(1e6), (asked, seed) => {
        const task = make(asked, seed);
        const best = largest(task.truth(everySequence(asked.length, asked.alphabet)));
        expect(task.optimum.known).toBe('exact');
        expect(Math.abs(task.optimum.value - best)).toBeLessThan(1e-12);
      }),
      { numRuns: 100 },
    );
  });

  test('lets adjacent sites interact up to K apart around the ring, and no others', () => {
    const expected = [];
    for (let i = 0; i < 9; i++) {
      for (let j = i + 1; j < 9; j++) if (Math.min(j - i, 9 - (j - i)) <= 2) expected.push(`${i}-${j}`);
    }
    expect(interactingPairs(make({ length: 9, interactions: 2 }, 1))).toEqual(expected);
  });

  test('draws random neighbours anew for every seed', () => {
    const wirings = [1, 2, 3].map((seed) =>
      interactingPairs(make({ length: 12, interactions: 1, neighbourhood: 'random' }, seed)).join(' '),
    );
    expect(new Set(wirings).size).toBe(3);
  });

  test('scores between 0 and 1, around 1/2', () => {
    const task = make({ length: 30, interactions: 3 }, 4);
    const scores = task.truth(sampleUniform(task.space, 2000, rootStream(1)));
    expect(scores.every((score) => score > 0 && score < 1)).toBe(true);
    const { mean } = summarize(Array.from(scores));
    expect(Math.abs(mean - 0.5)).toBeLessThan(0.1);
  });

  test('knows the optimum exactly up to 4 adjacent interactions at the default length and alphabet', () => {
    expect(make({ interactions: 4 }, 1).optimum.known).toBe('exact');
  });

  test('says best-known where the optimum is beyond exact search, and still climbs far above a random pool', () => {
    const task = make({ length: 60, interactions: 4, neighbourhood: 'random' }, 1);
    expect(task.optimum.known).toBe('best-known');
    expect(scoreOf(task, task.optimum.design!)).toBe(task.optimum.value);
    const pool = task.truth(sampleUniform(task.space, 5000, rootStream(1)));
    expect(task.optimum.value).toBeGreaterThan(largest(pool) + 0.1);
  });

  test('names letters by the size of the alphabet', () => {
    const levels = (alphabet: number) => make({ length: 2, interactions: 0, alphabet }, 1).space.columns[0];
    expect(levels(2)).toMatchObject({ levels: ['0', '1'] });
    expect(levels(4)).toMatchObject({ levels: ['A', 'C', 'G', 'T'] });
    expect(levels(20)).toMatchObject({ levels: [...'ACDEFGHIKLMNPQRSTVWY'] });
  });

  test.each([
    [{ length: 5, interactions: 5 }, /at most length − 1 = 4, got 5/],
    [{ length: 30, interactions: 20, alphabet: 2 }, /30 tables of 2\^21 numbers are more than 5000000/],
    [{ length: 10, interactions: 9, alphabet: 20 }, /lower interactions, alphabet or length/],
  ])('refuses %j with the reason', (settings, reason) => {
    expect(() => make(settings, 1)).toThrow(OnebatchError);
    expect(() => make(settings, 1)).toThrow(reason);
  });
});

test('everySequence(length, alphabet) counts up with the first letter most significant', () => {
  const all = everySequence(3, 2);
  expect(Array.from(rowView(all, 6))).toEqual([1, 1, 0]);
});
