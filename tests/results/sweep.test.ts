import { describe, expect, test } from 'vitest';
import { type CellRow, cellId } from '../../harness/row.js';
import { describeChoices } from '../../results/sweep/describe-choices.js';
import { choosingHalf } from '../../results/sweep/halves.js';
import type { SweepPlan } from '../../results/sweep/sweep-plan.js';
import { chooseSettings, rowsToReport } from '../../results/sweep.js';
import { makeRow, makeSeconds } from './made-ledger.js';

const tasks = ['s', 't', 'u'];

/** A plan with one sweep of the variants a and b, labelled `firm`. */
const plan = (on: SweepPlan['on'], variants = ['firm(a)', 'firm(b)']): SweepPlan => ({
  on,
  tasks,
  sweeps: [{ method: 'firm', variants: variants.map((label, i) => ({ label, settings: `0000000${i}` })) }],
});

/** Scores of `firm(a)` and `firm(b)` on four seeds of each task; b is better on even seeds and on task t only. */
const rows: CellRow[] = tasks.flatMap((task) =>
  [1, 2, 3, 4].flatMap((seed) => {
    const good = seed % 2 === 0 || task === 't';
    return [
      makeRow({ task, seed, method: 'idle', best: 0.6 }),
      makeRow({ task, seed, method: 'firm(a)', settings: '00000000', best: 0.7 }),
      makeRow({ task, seed, method: 'firm(b)', settings: '00000001', best: good ? 0.9 : 0.1 }),
    ];
  }),
);
const options = { seconds: makeSeconds(rows), score: 'best' } as const;

const places = (chosen: readonly CellRow[], method: string): string[] =>
  chosen.filter((row) => row.method === method).map(({ task, seed }) => `${task}${seed}`);

describe('choosingHalf(on, tasks)', () => {
  test('even seeds choose, whatever other seeds there are', () => {
    const chooses = choosingHalf('seeds', tasks);
    expect([1, 2, 3, 4, 5].map((seed) => chooses({ task: 's', seed }))).toEqual([
      false,
      true,
      false,
      true,
      false,
    ]);
  });

  test('every second task of the plan chooses with all its seeds; a task that is not in the plan reports', () => {
    const chooses = choosingHalf('tasks', ['p', 'q', 'r', 's']);
    expect(['p', 'q', 'r', 's', 'other'].map((task) => chooses({ task, seed: 2 }))).toEqual([
      false,
      true,
      false,
      true,
      false,
    ]);
    expect(chooses({ task: 'q', seed: 1 })).toBe(true);
  });
});

describe('chooseSettings(rows, plan, options)', () => {
  test('by seeds, reports the variant that won on even seeds on the odd ones alone, under the label of the sweep', () => {
    const chosen = chooseSettings(rows, plan('seeds'), options);
    expect(chosen.sweeps).toMatchObject({
      on: 'seeds',
      choosingTasks: [],
      choices: [
        { method: 'firm', variants: 2, variant: 'firm(b)', by: 'best', tasks: 3, cells: 6, leftOut: 0 },
      ],
    });
    expect(chosen.sweeps.choices[0]!.score).toBeCloseTo(0.9, 12);
    expect([...new Set(chosen.rows.map(({ method }) => method))].sort()).toEqual(['firm', 'idle']);
    expect(places(chosen.rows, 'firm')).toEqual(['s1', 's3', 't1', 't3', 'u1', 'u3']);
    expect(
      chosen.rows.filter(({ method }) => method === 'firm').map(({ best, settings }) => [best, settings]),
    ).toEqual([
      [0.1, '00000001'],
      [0.1, '00000001'],
      [0.9, '00000001'],
      [0.9, '00000001'],
      [0.1, '00000001'],
      [0.1, '00000001'],
    ]);
  });

  test('reports all other methods on the same half, for pairing', () => {
    for (const on of ['seeds', 'tasks'] as const) {
      const chosen = chooseSettings(rows, plan(on), options);
      expect(places(chosen.rows, 'idle')).toEqual(places(chosen.rows, 'firm'));
    }
  });

  test('by tasks, chooses on the second and reports on the first and third, with all seeds', () => {
    const worse = rows.map((row) =>
      row.task === 't' && row.method === 'firm(b)' ? { ...row, best: 0.2 } : row,
    );
    const chosen = chooseSettings(worse, plan('tasks'), options);
    expect(chosen.sweeps).toMatchObject({
      on: 'tasks',
      choosingTasks: ['t'],
      choices: [{ variant: 'firm(a)', tasks: 1, cells: 4 }],
    });
    expect(places(chosen.rows, 'firm')).toEqual(['s1', 's2', 's3', 's4', 'u1', 'u2', 'u3', 'u4']);
    expect(chooseSettings(rows, plan('tasks'), options).sweeps.choices[0]!.variant).toBe('firm(b)');
  });

  test('no score of the reported half moves the choice, and none of the choosing half what is reported of it', () => {
    const chooses = choosingHalf('seeds', tasks);
    const other = chooseSettings(
      rows.map((row) => (chooses(row) ? row : { ...row, best: 1 - row.best })),
      plan('seeds'),
      options,
    );
    expect(other.sweeps).toEqual(chooseSettings(rows, plan('seeds'), options).sweeps);
    const raised = chooseSettings(
      rows.map((row) => (chooses(row) ? { ...row, best: row.best + 1 } : row)),
      plan('seeds'),
      options,
    );
    expect(raised.rows).toEqual(chooseSettings(rows, plan('seeds'), options).rows);
  });

  test('on the same cells, chooses and reports on all of them', () => {
    const chosen = chooseSettings(rows, plan('seeds'), { ...options, sameCells: true });
    expect(chosen.sweeps).toMatchObject({ on: 'same cells', choices: [{ cells: 12, variant: 'firm(a)' }] });
    expect(places(chosen.rows, 'firm')).toHaveLength(12);
  });

  test('keeps the seconds of every cell that is reported', () => {
    const chosen = chooseSettings(rows, plan('seeds'), options);
    expect(chosen.seconds.size).toBe(chosen.rows.length);
    for (const row of chosen.rows) expect(chosen.seconds.get(cellId(row))).toBe(1 + row.seed);
  });

  test('leaves the rows of other ledgers without a sweep as they are, on the reported half', () => {
    const more = [1, 2].map((seed) => makeRow({ task: 'v', seed, method: 'other' }));
    expect(places(chooseSettings([...rows, ...more], plan('seeds'), options).rows, 'other')).toEqual(['v1']);
    expect(places(chooseSettings([...rows, ...more], plan('tasks'), options).rows, 'other')).toEqual([
      'v1',
      'v2',
    ]);
  });

  test.each<[string, CellRow[], SweepPlan, string]>([
    [
      'a variant without a cell to choose on',
      rows.filter(({ method, seed }) => method !== 'firm(b)' || seed % 2 === 1),
      plan('seeds'),
      'the sweep of firm has no cell to choose on that all its 2 variants have yet; go on with the rehearsal',
    ],
    [
      'a chosen variant without a cell to report',
      rows.filter(({ seed }) => seed === 2),
      plan('seeds'),
      'the sweep of firm has no cell to report yet; go on with the rehearsal',
    ],
    [
      'a method with the label of the sweep',
      [...rows, makeRow({ method: 'firm', seed: 1 })],
      plan('seeds'),
      'firm is a sweep in one ledger and a method in another; compare each alone',
    ],
  ])('refuses %s', (_, given, sweeps, message) => {
    expect(() => chooseSettings(given, sweeps, options)).toThrow(message);
  });
});

describe('rowsToReport(rows, plan, options)', () => {
  test('chooses where the plan has a sweep, and leaves all rows as they are where it has none', () => {
    expect(rowsToReport(rows, plan('seeds'), options)).toEqual(chooseSettings(rows, plan('seeds'), options));
    expect(rowsToReport(rows, undefined, options)).toEqual({ rows, seconds: options.seconds, sweeps: null });
  });

  test('refuses the same cells where nothing is chosen', () => {
    expect(() => rowsToReport(rows, undefined, { ...options, sameCells: true })).toThrow(
      '--same-cells: the plan sweeps no setting; leave it out',
    );
  });
});

describe('describeChoices(sweeps)', () => {
  const words = (on: SweepPlan['on'], sameCells = false): string[] =>
    describeChoices(chooseSettings(rows, plan(on), { ...options, sameCells }).sweeps);

  test('by seeds', () => {
    expect(words('seeds')).toEqual([
      'Settings of firm: chosen among 2 by mean best on the even seeds (6 cells each): firm(b), mean best 0.900 there.',
      'Tables report the odd seeds only, on which no settings were chosen. Seeds that would decide count these alone; a plan needs twice as many.',
    ]);
  });

  test('by tasks', () => {
    expect(words('tasks')).toEqual([
      'Settings of firm: chosen among 2 by mean best on the tasks t (4 cells each): firm(b), mean best 0.900 there.',
      'Tables report the other tasks only, on which no settings were chosen.',
    ]);
  });

  test('on the same cells, marked', () => {
    expect(words('seeds', true)).toEqual([
      'CAUTION: the settings of firm were chosen among 2 on the very cells reported here, so its scores are too high: firm(a), mean best 0.700 there.',
    ]);
  });

  test('says how many cells were left out', () => {
    const few = rows.filter(
      ({ method, seed, task }) => !(method === 'firm(a)' && seed === 4 && task === 'u'),
    );
    expect(describeChoices(chooseSettings(few, plan('seeds'), options).sweeps)[0]).toContain(
      '(5 cells each; 1 more, which not all variants have, were left out)',
    );
  });
});
