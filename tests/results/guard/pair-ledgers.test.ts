import { describe, expect, test } from 'vitest';
import { splitLabels } from '../../../results/guard/choose-methods.js';
import { pairLedgers } from '../../../results/guard/pair-ledgers.js';
import { makePlan, makeRows, makeSide } from './guarded.js';

const plan = makePlan(['hill', 'dale'], ['a', 'b']);
const rows = makeRows(plan, (_, __, seed) => seed / 10);
const before = makeSide('before', plan, rows);
const pair = (after: ReturnType<typeof makeSide>, methods?: string) =>
  pairLedgers(before, after, { score: 'best', methods });

describe('pairLedgers(before, after, options)', () => {
  test('pairs the same cells, whatever the order of rows', () => {
    const better = makeRows(plan, (_, __, seed) => (seed + 1) / 10).reverse();
    const { methods, remarks } = pair(makeSide('after', plan, better));
    expect(methods.map(({ method }) => method)).toEqual(['a', 'b']);
    expect(methods[0]!.sections.map(({ task }) => task)).toEqual(['hill', 'dale']);
    for (const difference of methods[0]!.sections[0]!.differences) expect(difference).toBeCloseTo(0.1, 12);
    expect(remarks).toEqual([]);
  });

  test("lets another processor's rounding pass, in scores and in what fixes the instance", () => {
    const rounded = rows.map((row) => ({ ...row, best: row.best + 1e-13, top: row.top * (1 + 1e-13) }));
    const { methods } = pair(makeSide('after', plan, rounded));
    expect(methods[0]!.sections[0]!.differences).toEqual([0, 0, 0, 0]);
  });

  test('pairs ledgers with other numbers of seeds over those in common, and says so', () => {
    const more = makePlan(['hill', 'dale'], ['a', 'b'], { seeds: 6 });
    const { methods, remarks } = pair(
      makeSide(
        'after',
        more,
        makeRows(more, () => 0.5),
      ),
    );
    expect(methods[0]!.sections[0]!.seeds).toEqual([1, 2, 3, 4]);
    expect(remarks).toContain('hill (open): 4 seeds in common, of 4 in the baseline and 6 in the candidate');
  });

  test('leaves methods out that only one ledger holds, and says so', () => {
    const other = makePlan(['hill', 'dale'], ['b', 'c']);
    const { methods, remarks } = pair(
      makeSide(
        'after',
        other,
        makeRows(other, () => 0.5),
      ),
    );
    expect(methods.map(({ method }) => method)).toEqual(['b']);
    expect(remarks).toEqual(
      expect.arrayContaining([
        'only in the baseline, so not compared: a',
        'only in the candidate, so not compared: c',
      ]),
    );
  });

  test('lets settings of methods differ, for these are what changed, and says so', () => {
    const tuned = {
      ...plan,
      methods: plan.methods.map((it) => ({ ...it, settings: it.label === 'a' ? { steps: 2 } : {} })),
    };
    const { remarks } = pair(makeSide('after', tuned, rows));
    expect(remarks).toEqual(['a has other settings: settings.steps: nothing -> 2']);
  });

  test.each<[string, () => ReturnType<typeof makeSide>, string]>([
    [
      'another pool',
      () => makeSide('after', { ...plan, pool: 99 }, rows),
      'their plans differ (pool: 100 -> 99)',
    ],
    [
      'another seed',
      () => makeSide('after', { ...plan, seed: 2 }, rows),
      'their plans differ (seed: 1 -> 2)',
    ],
    [
      'a task that gives other instances',
      () =>
        makeSide(
          'after',
          plan,
          rows.map((row) => ({ ...row, top: row.top + 0.1 })),
        ),
      'hill (open) is not the same in both: for seed 1 of "a" they have a top of 3.32237 and 3.42237',
    ],
    [
      'a cell that is missing',
      () =>
        makeSide(
          'after',
          plan,
          rows.filter(({ task, seed, method }) => task !== 'dale' || seed !== 2 || method !== 'b'),
        ),
      'after lacks 1 seed of "b" on dale (open): 2; run its plan to the end',
    ],
    [
      'no method in common',
      () => {
        const other = makePlan(['hill', 'dale'], ['x']);
        return makeSide(
          'after',
          other,
          makeRows(other, () => 0.5),
        );
      },
      'they have no method in common (a, b; x)',
    ],
  ])('refuses %s in one line', (_, makeAfter, line) => {
    const refusal = (() => {
      try {
        pair(makeAfter());
        return 'nothing';
      } catch (error) {
        return (error as Error).message;
      }
    })();
    expect(refusal).toContain(line);
    expect(refusal).not.toContain('\n');
  });

  test('refuses a method asked for that is not there, with the nearest label', () => {
    const named = makePlan(['hill', 'dale'], ['jitter']);
    const side = makeSide(
      'one',
      named,
      makeRows(named, () => 0.5),
    );
    expect(() => pairLedgers(side, side, { score: 'best', methods: 'jiter' })).toThrow(
      '--methods: one holds no method "jiter"; did you mean "jitter"?',
    );
  });
});

describe('splitLabels(text, known)', () => {
  test.each([
    ['a,b', ['a', 'b'], ['a', 'b']],
    ['firm(x=1,y=2),b', ['firm(x=1,y=2)', 'firm(x=1', 'b'], ['firm(x=1,y=2)', 'b']],
    ['a, b', ['a', 'b'], ['a', 'b']],
    ['unknown,b', ['b'], ['unknown', 'b']],
    ['', ['a'], []],
  ])('%j with %j known gives %j', (text, known, labels) => {
    expect(splitLabels(text, known)).toEqual(labels);
  });
});
