import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CellRow } from '../../harness/row.js';
import { type Comparison, compareRows } from '../../results/comparison.js';
import { makeRow, makeSeconds, type RowParts } from './made-ledger.js';

const version = '0.1.0';

/** One row a seed, with the bests given. */
function makeMethod(method: string, bests: readonly number[], parts: Partial<RowParts> = {}) {
  return bests.map((best, seed) => makeRow({ method, seed, best, ...parts }));
}

function methodOf({ sections }: Comparison, method: string, section = 0) {
  const scores = sections[section]!.methods.find((it) => it.method === method);
  if (scores === undefined) throw new Error(`no method ${method}`);
  return scores;
}

describe('compareRows(rows, options): one task', () => {
  it('takes means over seeds and sorts methods by their mean best', () => {
    const comparison = compareRows(
      [...makeMethod('low', [0.1, 0.2, 0.3]), ...makeMethod('high', [0.7, 0.8, 0.9], { median: 0.4 })],
      { version },
    );
    expect(comparison.sections[0]!.methods.map(({ method }) => method)).toEqual(['high', 'low']);
    const high = methodOf(comparison, 'high');
    expect(high.best.value).toBeCloseTo(0.8, 12);
    expect(high.median.value).toBeCloseTo(0.4, 12);
    expect(high.lift.value).toBeCloseTo(0.2, 12);
    expect(comparison.sections[0]!.bestVisible.value).toBeCloseTo(0.6, 12);
  });

  it("gives Student's t interval below 8 seeds: mean 0.8, deviation 0.1, t(2) = 4.303 of the printed tables", () => {
    const { interval, n } = methodOf(
      compareRows(makeMethod('high', [0.7, 0.8, 0.9]), { version }),
      'high',
    ).best;
    expect(n).toBe(3);
    expect(interval).toMatchObject({ method: 'student-t', level: 0.95 });
    expect(interval!.low).toBeCloseTo(0.8 - (4.303 * 0.1) / Math.sqrt(3), 4);
    expect(interval!.high).toBeCloseTo(0.8 + (4.303 * 0.1) / Math.sqrt(3), 4);
  });

  it('gives a transformed interval from 8 seeds on, and none for one seed', () => {
    const bests = [0.5, 0.6, 0.7, 0.8, 0.9, 0.4, 0.55, 0.62];
    const many = methodOf(compareRows(makeMethod('a', bests), { version, resamples: 200 }), 'a').best;
    expect(many.interval!.method).toBe('transformed-t');
    const one = compareRows(makeMethod('a', [0.5]), { version });
    expect(methodOf(one, 'a').best).toEqual({ value: 0.5, n: 1, interval: null });
    expect(one.sections[0]!.bestVisible.interval).toBeNull();
    expect(one.sections[0]!.reference).toBeNull();
    expect(one.notes.verdicts).toEqual([]);
  });

  it('takes optimism over the cells that stated a belief, and says how many', () => {
    const rows = makeMethod('a', [0.5, 0.6, 0.7]).map((row, i) => ({
      ...row,
      optimism: i === 0 ? undefined : 0.1 * i,
    }));
    const { optimism } = methodOf(compareRows(rows, { version }), 'a');
    expect(optimism!.n).toBe(2);
    expect(optimism!.value).toBeCloseTo(0.15, 12);
    expect(methodOf(compareRows(makeMethod('b', [0.5]), { version }), 'b').optimism).toBeNull();
  });

  it('keeps failed cells in the means, counts them, and gives their reason', () => {
    const rows = [
      ...makeMethod('a', [0.8, 0.8]),
      makeRow({ method: 'a', seed: 2, best: 0.2, status: 'failed', reason: 'out of time.', distinct: 0 }),
    ];
    const comparison = compareRows(rows, { version });
    const scores = methodOf(comparison, 'a');
    expect(scores).toMatchObject({ cells: 3, failures: 1, distinct: 128 });
    expect(scores.best.value).toBeCloseTo(0.6, 12);
    expect(comparison.notes.failed.map(({ text }) => text)).toEqual([
      'a failed 1 of 3 cells on hartmann-6: out of time',
    ]);
  });

  it('takes mean seconds over the cells whose time is known', () => {
    const rows = makeMethod('a', [0.5, 0.6, 0.7]);
    expect(methodOf(compareRows(rows, { version, seconds: makeSeconds(rows) }), 'a').seconds).toBe(2);
    expect(methodOf(compareRows(rows, { version, seconds: makeSeconds([rows[2]!]) }), 'a').seconds).toBe(3);
    expect(methodOf(compareRows(rows, { version }), 'a').seconds).toBeNull();
  });

  it('reports the ranges of batch and visible rows and every way the top is known', () => {
    const rows = [
      makeRow({ method: 'a', seed: 0, visible: 90, topKnown: 'exact' }),
      makeRow({ method: 'a', seed: 1, visible: 110, topKnown: 'best-known' }),
    ];
    expect(compareRows(rows, { version }).sections[0]).toMatchObject({
      seeds: 2,
      visible: { least: 90, most: 110 },
      batch: { least: 128, most: 128 },
      top: ['exact', 'best-known'],
    });
  });

  it('does without a section over all tasks when there is one task', () => {
    expect(compareRows(makeMethod('a', [0.5]), { version }).overall).toBeNull();
  });
});

describe('compareRows(rows, options): all tasks', () => {
  const rows = [
    ...makeMethod('a', [0.1, 0.2], { task: 't1' }),
    ...makeMethod('a', [0.6, 0.7, 0.8, 1.3], { task: 't2' }),
    ...makeMethod('b', [0.5, 0.5], { task: 't1', optimism: 0.3 }),
  ];
  const { overall, notes } = compareRows(rows, { version, seconds: makeSeconds(rows), resamples: 500 });
  const a = overall!.methods.find(({ method }) => method === 'a')!;

  it('takes the mean of task means, not of cells: (0.15 + 0.85) / 2', () => {
    expect(a.best.mean.value).toBeCloseTo(0.5, 12);
    expect(a.best.mean.n).toBe(6);
    expect(a.lift.value).toBeCloseTo(-0.1, 12);
    expect(a.seconds).toBeCloseTo((1.5 + 2.5) / 2, 12);
  });

  it('takes the interquartile mean of all cells: (½·0.2 + 0.6 + 0.7 + ½·0.8) / 3', () => {
    expect(a.best.interquartileMean.value).toBeCloseTo(0.6, 12);
  });

  it('gives means the interval of Satterthwaite: s²/n 0.0025 and 0.0967/4, 3.54 degrees of freedom', () => {
    // √(0.0025 + 0.02417) / 2 = 0.0816 times t₀.₉₇₅ between the printed 3.182 (3) and 2.776 (4).
    const { low, high, method } = a.best.mean.interval!;
    expect(method).toBe('stratified-t');
    expect((low + high) / 2).toBeCloseTo(0.5, 12);
    expect((high - low) / 2).toBeGreaterThan(0.0816 * 2.776);
    expect((high - low) / 2).toBeLessThan(0.0817 * 3.182);
  });

  it('gives interquartile means the bootstrap within tasks', () => {
    const { low, high, method } = a.best.interquartileMean.interval!;
    expect(method).toBe('stratified-expanded-percentile');
    expect(low).toBeGreaterThanOrEqual(0.1);
    expect(high).toBeLessThanOrEqual(1.3);
    expect(low).toBeLessThan(0.6);
    expect(high).toBeGreaterThan(0.6);
  });

  it('gives no interval where a task has a single cell', () => {
    const single = [
      ...rows,
      ...makeMethod('c', [0.5], { task: 't1' }),
      ...makeMethod('c', [0.4, 0.6], { task: 't2' }),
    ];
    const c = compareRows(single, { version, resamples: 50 }).overall!.methods.find(
      (it) => it.method === 'c',
    )!;
    expect(c.best.mean).toEqual({ value: 0.5, n: 3, interval: null });
  });

  it('keeps the line to beat as a row of its own, with one cell for each seed', () => {
    expect(overall!.bestVisible.mean.value).toBeCloseTo(0.6, 12);
    expect(overall!.bestVisible.mean.n).toBe(6);
  });

  it('says which methods lack tasks or seeds', () => {
    const partial = [...rows, ...makeMethod('b', [0.5], { task: 't2' })];
    expect(notes.incomplete.map(({ methods }) => methods)).toEqual([['b']]);
    expect(notes.incomplete[0]!.text).toMatch(/1 of 2 tasks/);
    const { incomplete } = compareRows(partial, { version, resamples: 50 }).notes;
    expect(incomplete.map(({ text }) => text)).toEqual([expect.stringContaining('b has 1 of 4 seeds on t2')]);
  });
});

describe('compareRows(rows, options): notes', () => {
  const bests = [0.7, 0.72, 0.74, 0.71];
  const careful = makeMethod('careful', bests, { optimism: 0.01 });
  const naive = [0.5, 0.7, 0.6, 0.6].map((optimism, seed) =>
    makeRow({ method: 'naive', seed, best: 0.4, optimism }),
  );

  it('tells the verdicts against the reference of each task, with differences and intervals', () => {
    const few = { version, against: 'careful' };
    const worse = makeMethod('worse', [0.4, 0.41, 0.45, 0.43]);
    // Four pairs allow no p below 2/16, so nothing can be decided.
    expect(compareRows([...careful, ...worse], few).notes.verdicts.map(({ text }) => text)).toEqual([
      'against careful on hartmann-6: undecided: all 1, the nearest (worse) at about 6 seeds',
    ]);
    const more = (rows: readonly CellRow[]) => [...rows, ...rows].map((row, i) => ({ ...row, seed: i }));
    const [note] = compareRows([...more(careful), ...more(worse)], few).notes.verdicts;
    // −0.30, −0.31, −0.29, −0.28, each twice: deviation 0.01195, t(7) = 2.365 of the printed tables: ± 0.0100.
    expect(note!.text).toBe('against careful on hartmann-6: hurts worse -0.295 [-0.305, -0.285]');
  });

  it('names as fooled the most optimistic method whose optimism excludes 0 and did not pay', () => {
    const { fooled } = compareRows([...careful, ...naive], { version }).notes;
    // Mean 0.6, deviation 0.08165, t(3) = 3.182: ± 0.1299.
    expect(fooled.map(({ text }) => text)).toEqual([
      'naive believed its batch 0.60 [0.47, 0.73] above the truth on hartmann-6, and its best design fell 0.200 short of the best visible one on average',
    ]);
  });

  it('does not name the reference as fooled, which only stands for what was measured', () => {
    expect(compareRows([...careful, ...naive], { version, against: 'naive' }).notes.fooled).toEqual([]);
  });

  it('names nobody as fooled where the optimism could be 0, or its method found the best designs', () => {
    const unsure = naive.map((row, i) => ({ ...row, optimism: i % 2 === 0 ? 2 : -1 }));
    expect(compareRows([...careful, ...unsure], { version }).notes.fooled).toEqual([]);
    const winner = naive.map((row) => ({ ...row, best: 0.95, lift: 0.35 }));
    expect(compareRows([...careful, ...winner], { version }).notes.fooled).toEqual([]);
  });
});

describe('compareRows(rows, options): determinism', () => {
  const rows = ['t1', 't2'].flatMap((task) =>
    ['a', 'b'].flatMap((method, m) =>
      Array.from({ length: 9 }, (_, seed) =>
        makeRow({ task, method, seed, best: Math.sin(seed + m), optimism: Math.cos(seed * (m + 1)) }),
      ),
    ),
  );
  const options = { version, resamples: 100 };

  it('does not depend on the order of the rows', () => {
    const expected = compareRows(rows, options);
    fc.assert(
      fc.property(fc.shuffledSubarray(rows, { minLength: rows.length }), (shuffled) => {
        expect(compareRows(shuffled, options)).toEqual(expected);
      }),
      { numRuns: 10 },
    );
  });

  it('gives a method the same numbers whatever other methods there are', () => {
    const alone = compareRows(
      rows.filter(({ method }) => method === 'b'),
      options,
    );
    expect(methodOf(alone, 'b')).toEqual(methodOf(compareRows(rows, options), 'b'));
  });

  it('gives methods with the same scores the same intervals', () => {
    const twins = rows.filter(({ method }) => method === 'a').map((row) => ({ ...row, method: 'twin' }));
    const comparison = compareRows([...rows, ...twins], options);
    expect(methodOf(comparison, 'twin').best).toEqual(methodOf(comparison, 'a').best);
  });

  it('draws other resamples for another seed', () => {
    const low = (seed: number) =>
      compareRows(rows, { ...options, seed }).overall!.methods[0]!.best.interquartileMean.interval!.low;
    expect(low(1)).not.toBe(low(0));
  });

  it('holds nothing but what JSON can hold', () => {
    const comparison = compareRows(rows, options);
    expect(JSON.parse(JSON.stringify(comparison))).toEqual(comparison);
  });
});
