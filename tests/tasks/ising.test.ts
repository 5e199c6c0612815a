import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { OnebatchError } from '../../harness/errors.js';
import { rootStream } from '../../harness/random.js';
import type { Task } from '../../harness/task.js';
import { type Coupling, ising, pairScoreTask } from '../../tasks/ising.js';
import reference from '../reference/combinatorial.json' with { type: 'json' };
import { describeTaskContract } from './contract.js';
import { everySequence, interactingPairs, largest, scoreOf, summarize } from './sequences.js';

type Settings = Parameters<typeof ising.settings.parse>[0];

const make = (settings: Settings, seed: number): Task =>
  ising.make(ising.settings.parse(settings), rootStream(seed).split('ising test'));

/** Chain or ring of couplings: `tables[i]` joins site i to the next, the last of as many as sites to site 0. */
const inARow = (tables: readonly number[][], length: number): Coupling[] =>
  tables.map((table, i) => ({ sites: [i, (i + 1) % length], table }));

/** Spins −1 and +1 as letters 0 and 1. */
const spinTask = (fields: readonly number[], couplings: readonly number[]): Task =>
  pairScoreTask({
    fields: fields.map((h) => [-h, h]),
    couplings: inARow(
      couplings.map((j) => [j, -j, -j, j]),
      fields.length,
    ),
    letters: ['-', '+'],
  });

/** Uniform Potts model without fields: `strength` for every pair of equal neighbours. */
function uniformPotts(letters: number, length: number, strength: number, ring: boolean): Task {
  const table = Array.from({ length: letters ** 2 }, (_, k) => (k % (letters + 1) === 0 ? strength : 0));
  return pairScoreTask({
    fields: Array.from({ length }, () => new Array<number>(letters).fill(0)),
    couplings: inARow(new Array<number[]>(ring ? length : length - 1).fill(table), length),
    letters: Array.from({ length: letters }, (_, k) => `${k}`),
  });
}

function allScores(task: Task): Float64Array {
  const first = task.space.columns[0]!;
  return task.truth(
    everySequence(task.space.columns.length, first.kind === 'category' ? first.levels.length : 0),
  );
}

const partition = (task: Task): number => allScores(task).reduce((sum, score) => sum + Math.exp(score), 0);

const factValues = (opening: string) =>
  reference.chain_facts.find(({ fact }) => fact.startsWith(opening))!.values as Record<string, number>;

describeTaskContract(
  'ising',
  ising,
  [{}, { length: 2, alphabet: 20, range: 1 }, { length: 30, alphabet: 3, range: 4, couplingScale: 3 }],
  { instances: 3 },
);

// Instances with all numbers written out, enumerated with numpy: tests/reference/combinatorial.json, chain_instances.
describe.each(reference.chain_instances)('pairScoreTask(score) on the reference instance $id', (instance) => {
  const isIsing = instance.kind === 'ising';
  const task = isIsing
    ? spinTask(instance.fields as number[], instance.couplings as number[])
    : pairScoreTask({
        fields: instance.fields as number[][],
        couplings: inARow(
          (instance.couplings as number[][][]).map((rows) => rows.flat()),
          instance.L,
        ),
        letters: ['a', 'b', 'c', 'd'],
      });
  const lettersOf = (states: number[]): number[] => (isIsing ? states.map((s) => (s + 1) / 2) : states);
  const scores = allScores(task);

  test('scores the listed sequences', () => {
    for (const { s, score } of instance.probes) expect(scoreOf(task, lettersOf(s))).toBeCloseTo(score, 12);
    expect(scoreOf(task, lettersOf(instance.second_argmax))).toBeCloseTo(instance.second_best, 12);
    expect(scoreOf(task, lettersOf(instance.argmin))).toBeCloseTo(instance.min, 12);
  });

  test('has the listed mean and partition function over all sequences', () => {
    expect(summarize(Array.from(scores)).mean).toBeCloseTo(instance.mean_over_all, 12);
    expect(Math.log(partition(task))).toBeCloseTo(instance.log_partition_beta1, 10);
  });

  test('knows the listed optimum exactly', () => {
    expect(task.optimum.known).toBe('exact');
    expect(task.optimum.value).toBeCloseTo(instance.max, 12);
    expect(Array.from(task.optimum.design!)).toEqual(lettersOf(instance.argmax));
  });
});

describe('pairScoreTask(score)', () => {
  const strengths = fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: 2, maxLength: 40 });

  // Ising 1925: an open chain without field is not frustrated.
  test('reaches Σ|J| on an open chain of spins without field', () => {
    fc.assert(
      fc.property(strengths, (couplings) => {
        const { optimum } = spinTask(new Array<number>(couplings.length + 1).fill(0), couplings);
        const expected = couplings.reduce((sum, j) => sum + Math.abs(j), 0);
        expect(Math.abs(optimum.value - expected)).toBeLessThan(1e-10);
      }),
      { numRuns: 50 },
    );
  });

  // Elementary: a ring whose couplings multiply to a negative number must break its weakest bond.
  test('reaches Σ|J| on a ring of spins without field, less 2 min|J| when it is frustrated', () => {
    fc.assert(
      fc.property(
        strengths.filter((couplings) => couplings.length > 2),
        (couplings) => {
          const { optimum } = spinTask(new Array<number>(couplings.length).fill(0), couplings);
          const sizes = couplings.map(Math.abs);
          const frustrated = couplings.filter((j) => j < 0).length % 2 === 1;
          const expected = sizes.reduce((sum, j) => sum + j, 0) - (frustrated ? 2 * Math.min(...sizes) : 0);
          expect(Math.abs(optimum.value - expected)).toBeLessThan(1e-10);
        },
      ),
      { numRuns: 50 },
    );
  });

  // Ising 1925, transfer matrix.
  test('gives the partition functions of the uniform Ising chain and ring', () => {
    const { L, bJ, open, ring } = factValues('Uniform zero-field Ising') as Record<
      'L' | 'bJ' | 'open' | 'ring',
      number
    >;
    const none = new Array<number>(L).fill(0);
    expect(partition(spinTask(none, new Array<number>(L - 1).fill(bJ))) / open).toBeCloseTo(1, 12);
    expect(partition(spinTask(none, new Array<number>(L).fill(bJ))) / ring).toBeCloseTo(1, 12);
  });

  // Potts 1952, transfer matrix.
  test('gives the partition functions of the uniform Potts chain and ring', () => {
    const { q, L, bJ, open, ring } = factValues('Uniform q-state Potts') as Record<
      'q' | 'L' | 'bJ' | 'open' | 'ring',
      number
    >;
    expect(partition(uniformPotts(q, L, bJ, false)) / open).toBeCloseTo(1, 12);
    expect(partition(uniformPotts(q, L, bJ, true)) / ring).toBeCloseTo(1, 12);
  });

  // Chromatic polynomials of path and cycle (Whitney 1932).
  test('has as many optima on the antiferromagnetic Potts chain and ring as they have proper colourings', () => {
    const { q, L, open, ring } = factValues('Ground-state counts') as Record<
      'q' | 'L' | 'open' | 'ring',
      number
    >;
    const optima = (task: Task) => allScores(task).filter((score) => score === task.optimum.value).length;
    expect(optima(uniformPotts(q, L, -1, false))).toBe(open);
    expect(optima(uniformPotts(q, L, -1, true))).toBe(ring);
    expect(optima(uniformPotts(q, L, 1, false))).toBe(q);
  });
});

describe('ising.make(settings, stream)', () => {
  test('finds the exact optimum that trying every sequence finds', () => {
    const settings = fc
      .tuple(fc.integer({ min: 2, max: 6 }), fc.integer({ min: 1, max: 5 }), fc.integer({ min: 2, max: 4 }))
      .map(([length, range, alphabet]) => ({ length, range: Math.min(range, length - 1), alphabet }));
    fc.assert(
      fc.property(settings, fc.nat(1e6), (asked, seed) => {
        const task = make(asked, seed);
        expect(Math.abs(task.optimum.value - largest(allScores(task)))).toBeLessThan(1e-12);
      }),
      { numRuns: 100 },
    );
  });

  test('couples sites up to range apart on an open chain, and no others', () => {
    const expected = [];
    for (let i = 0; i < 8; i++) for (let j = i + 1; j < 8; j++) if (j - i <= 3) expected.push(`${i}-${j}`);
    expect(interactingPairs(make({ length: 8, range: 3 }, 1))).toEqual(expected);
  });

  test('with couplingScale 0 couples nothing', () => {
    expect(interactingPairs(make({ length: 8, range: 3, couplingScale: 0 }, 1))).toEqual([]);
  });

  // A score is a sum of independent normals: `length` fields with variance 1, the couplings with variance scale².
  test.each([
    [{ length: 10, range: 2, couplingScale: 0 }, 10],
    [{ length: 10, range: 2, couplingScale: 2 }, 10 + 17 * 4],
  ])('with %j gives a design a score of mean 0 and variance %d over seeds', (settings, expected) => {
    const scores = Array.from({ length: 300 }, (_, seed) =>
      scoreOf(make(settings, seed), new Float64Array(10)),
    );
    const { mean, standardError, variance } = summarize(scores);
    expect(Math.abs(mean)).toBeLessThan(4 * standardError);
    // The variance of n normals has a standard error of variance · √(2 / (n − 1)).
    expect(Math.abs(variance / expected - 1)).toBeLessThan(4 * Math.sqrt(2 / 299));
  });

  test.each([
    [{ length: 4, range: 4 }, /at most length − 1 = 3, got 4/],
    [{ length: 500, range: 3, alphabet: 20 }, /exact optimum would take .* lower range, alphabet or length/],
    [{ length: 2000, range: 1999 }, /lower range, alphabet or length/],
  ])('refuses %j with the reason', (settings, reason) => {
    expect(() => make(settings, 1)).toThrow(OnebatchError);
    expect(() => make(settings, 1)).toThrow(reason);
  });
});
