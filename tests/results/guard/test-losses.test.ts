import { describe, expect, test } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import type { MethodPairs } from '../../../results/guard/pair-ledgers.js';
import { type LossTest, testLosses } from '../../../results/guard/test-losses.js';
import { skewedScore } from './guarded.js';

const margin = 0.02;

/** Pairs of methods on tasks, with the differences that `draw` gives. */
function makePairs(
  size: { readonly methods: number; readonly tasks: number; readonly seeds: number },
  draw: (method: number) => number,
): MethodPairs[] {
  const seeds = Array.from({ length: size.seeds }, (_, i) => i + 1);
  return Array.from({ length: size.methods }, (_, m) => ({
    method: `m${m}`,
    sections: Array.from({ length: size.tasks }, (_, t) => ({
      ...{ task: `t${t}`, curtain: 'open', seeds, unpaired: 0, failures: { before: 0, after: 0 } },
      differences: seeds.map(() => draw(m)),
    })),
  }));
}

const single = (differences: readonly number[]): LossTest => {
  const seeds = differences.map((_, i) => i + 1);
  const section = {
    task: 't',
    curtain: 'open',
    seeds,
    differences,
    unpaired: 0,
    failures: { before: 0, after: 0 },
  };
  return testLosses([{ method: 'm', sections: [section] }], { margin, stream: rootStream(1) })[0]!;
};

describe('testLosses(methods, { margin })', () => {
  test('tells a regression, a small loss, no regression, nothing changed, and too few seeds', () => {
    const around = (mean: number, spread: number, n = 12) =>
      Array.from({ length: n }, (_, i) => mean + spread * ((i % 3) - 1));
    expect(single(around(-0.05, 0.02)).outcome).toBe('regression');
    expect(single(around(-0.005, 0.002)).outcome).toBe('small loss');
    expect(single(around(0.001, 0.01)).outcome).toBe('no regression');
    expect(single(around(0, 0)).outcome).toBe('unchanged');
    expect(single(around(-0.01, 0.05)).outcome).toBe('too few seeds');
    expect(single([-0.5]).outcome).toBe('too few seeds');
  });

  test('a gain is never a regression, however large', () => {
    expect(single([0.5, 0.6, 0.4, 0.5, 0.7, 0.6, 0.5]).outcome).toBe('no regression');
  });

  test('counts only what changed among the tests: others would make it blind', () => {
    const lossy = makePairs({ methods: 40, tasks: 1, seeds: 8 }, (m) => (m === 0 ? -0.1 : 0));
    const [first] = testLosses(lossy, { margin, stream: rootStream(2) });
    expect(first).toMatchObject({ outcome: 'regression', lossP: 2 ** -8 });
  });

  test('tests all tasks together too where there are several', () => {
    const tests = testLosses(
      makePairs({ methods: 1, tasks: 3, seeds: 4 }, () => 0),
      { margin, stream: rootStream(3) },
    );
    expect(tests.map(({ place }) => place?.task ?? 'all')).toEqual(['t0', 't1', 't2', 'all']);
    expect(tests[3]!.pairs).toBe(12);
  });

  test('takes other random numbers of skewed scores for a regression in at most 5 % of guards', () => {
    const stream = rootStream(4);
    const guards = 100;
    let alarms = 0;
    for (let guard = 0; guard < guards; guard++) {
      const pairs = makePairs(
        { methods: 3, tasks: 2, seeds: 8 },
        () => skewedScore(stream) - skewedScore(stream),
      );
      const tests = testLosses(pairs, { margin, stream: stream.split('guard', guard) });
      alarms += Number(tests.some(({ outcome }) => outcome === 'regression' || outcome === 'small loss'));
    }
    // Four standard errors above the level would be an error.
    expect(alarms / guards).toBeLessThan(0.05 + 4 * Math.sqrt((0.05 * 0.95) / guards));
    expect(alarms).toBeGreaterThan(0);
  });

  test('finds a true loss of the margin about as often as its power says', () => {
    const stream = rootStream(5);
    const guards = 300;
    const deviation = 0.03;
    let found = 0;
    let promised = 0;
    for (let guard = 0; guard < guards; guard++) {
      const pairs = makePairs(
        { methods: 1, tasks: 1, seeds: 13 },
        () => -margin + deviation * stream.normal(),
      );
      const [only] = testLosses(pairs, { margin, stream: stream.split('guard', guard) });
      found += Number(only!.lossP <= 0.05);
      promised += only!.power! / guards;
    }
    // The power is worked out from each sample's own deviation, which costs a few points of precision.
    expect(Math.abs(found / guards - promised)).toBeLessThan(0.03 + 4 * Math.sqrt(0.25 / guards));
  });

  test('refuses a margin that is not above 0', () => {
    const pairs = makePairs({ methods: 1, tasks: 1, seeds: 4 }, () => 0.1);
    expect(() => testLosses(pairs, { margin: 0, stream: rootStream(1) })).toThrow(RangeError);
  });
});
