import { describe, expect, test } from 'vitest';
import { canonicalJson } from '../../harness/canonical.js';
import type { Cell } from '../../harness/cells.js';
import { cellsOf } from '../../harness/cells.js';
import { rowKey } from '../../harness/designs.js';
import { OnebatchError } from '../../harness/errors.js';
import type { Plan } from '../../harness/plan/plan.js';
import { drawPool } from '../../harness/pool.js';
import { rootStream } from '../../harness/random.js';
import { sampleUniform } from '../../harness/space.js';
import { methodStream, setStage } from '../../harness/stage.js';
import { defineTaskFamily } from '../../harness/task.js';
import { slope, toyCatalogue } from './toy-catalogue.js';
import { toyPlan } from './toy-plan.js';
import { withoutDesign } from './toy-task.js';

const head = ['pool: 40', 'batch: 4'];

function cellNamed(plan: Plan, task: string, method: string, seed: number): Cell {
  return [...cellsOf(plan)].find(
    ({ key }) => key.task === task && key.method === method && key.seed === seed,
  )!;
}

/** What of a cell must not move: the numbers of its stage and the stream of its method. */
function numbersOf(plan: Plan, task: string, method: string, seed: number) {
  const cell = cellNamed(plan, task, method, seed);
  const stage = setStage(plan, cell, toyCatalogue);
  const probe = sampleUniform(stage.space, 5, rootStream(99));
  return {
    designs: stage.designs,
    scores: stage.scores,
    floor: stage.floor,
    top: stage.top,
    judged: stage.judge(probe),
    stream: methodStream(plan, cell).path,
  };
}

describe('the numbers of a cell', () => {
  const curtain = '{ ceiling: 0.6, thin: 12, noise: 0.3 }';
  const before = toyPlan(
    ...head,
    'seeds: 2',
    `curtains: [${curtain}]`,
    'tasks: [slope]',
    'methods: [scripted]',
  );
  const expected = numbersOf(before, 'slope', 'scripted', 2);

  test.each<[string, string[]]>([
    [
      'a method is added before it',
      [`curtains: [${curtain}]`, 'tasks: [slope]', 'methods: [idle-best, scripted]', 'seeds: 2'],
    ],
    [
      'a task is added before it',
      [`curtains: [${curtain}]`, 'tasks: [blend, slope]', 'methods: [scripted]', 'seeds: 2'],
    ],
    ['there are more seeds', [`curtains: [${curtain}]`, 'tasks: [slope]', 'methods: [scripted]', 'seeds: 9']],
    [
      'there is another curtain too',
      [`curtains: [{}, ${curtain}]`, 'tasks: [slope]', 'methods: [scripted]', 'seeds: 2'],
    ],
    [
      'defaults are written out',
      [
        `curtains: [${curtain}]`,
        'tasks: [{ task: slope, as: slope, settings: { columns: 3 } }]',
        'methods: [{ method: scripted, settings: { script: good } }]',
        'seeds: 2',
      ],
    ],
    [
      'the budget and what is kept change',
      [
        `curtains: [${curtain}]`,
        'tasks: [slope]',
        'methods: [scripted]',
        'seeds: 2',
        'budgetSeconds: 9',
        'keep: [traces]',
      ],
    ],
  ])('stay when %s', (_, lines) => {
    const after = toyPlan(...head, ...lines);
    const cells = [...cellsOf(after)].filter(({ key }) => key.curtain === 'ceiling=0.6 thin=12 noise=0.3');
    const cell = cells.find(
      ({ key }) => key.task === 'slope' && key.method === 'scripted' && key.seed === 2,
    )!;
    const only: Plan = { ...after, tasks: [{ ...cell.task, curtains: [cell.curtain] }] };
    expect(numbersOf(only, 'slope', 'scripted', 2)).toEqual(expected);
    const stage = setStage(after, cell, toyCatalogue);
    expect([stage.designs, stage.scores, methodStream(after, cell).path]).toEqual([
      expected.designs,
      expected.scores,
      expected.stream,
    ]);
  });

  test('stay when labels change', () => {
    const renamed = toyPlan(
      ...head,
      'seeds: 2',
      `curtains: [${curtain}]`,
      'tasks: [{ task: slope, as: other }]',
      'methods: [{ method: scripted, as: another }]',
    );
    expect(numbersOf(renamed, 'other', 'another', 2)).toEqual(expected);
  });

  test.each<[string, string[]]>([
    ["the plan's seed", ['tasks: [slope]', 'seed: 2']],
    ["a task's settings", ['tasks: [{ task: slope, as: slope, settings: { columns: 4 } }]']],
  ])('all change with %s', (_, lines) => {
    const other = numbersOf(
      toyPlan(...head, 'seeds: 2', `curtains: [${curtain}]`, 'methods: [scripted]', ...lines),
      'slope',
      'scripted',
      2,
    );
    expect(other.scores).not.toEqual(expected.scores);
    expect(other.floor).not.toBe(expected.floor);
    expect(other.stream).not.toBe(expected.stream);
  });

  test('differ from seed to seed: instance, pool and the stream of the method', () => {
    const other = numbersOf(before, 'slope', 'scripted', 1);
    expect(other.judged).not.toEqual(expected.judged);
    expect(other.designs).not.toEqual(expected.designs);
    expect(other.stream).not.toBe(expected.stream);
  });

  test('are shared by methods, all but the stream of the method', () => {
    const plan = toyPlan(...head, 'tasks: [slope]', 'methods: [scripted, idle-best]');
    const { stream: first, ...one } = numbersOf(plan, 'slope', 'scripted', 3);
    const { stream: second, ...other } = numbersOf(plan, 'slope', 'idle-best', 3);
    expect(other).toEqual(one);
    expect(second).not.toBe(first);
  });
});

describe('methodStream', () => {
  test('tells a method neither the task nor its settings nor the curtain', () => {
    const plan = toyPlan(...head, 'tasks: [slope]', 'curtains: [{ thin: 7 }]', 'methods: [scripted]');
    const { path } = methodStream(plan, cellNamed(plan, 'slope', 'scripted', 1));
    expect(path).toMatch(/^\["[0-9a-f]{64}"\]$/);
  });

  test('differs by curtain and by settings of the method', () => {
    const plan = toyPlan(
      ...head,
      'tasks: [slope]',
      'seeds: 1',
      'curtains: [{}, { thin: 7 }]',
      'methods: [scripted, { method: scripted, as: b, settings: { script: other } }]',
    );
    const paths = [...cellsOf(plan)].map((cell) => methodStream(plan, cell).path);
    expect(new Set(paths).size).toBe(4);
  });
});

describe('setStage', () => {
  const plan = toyPlan(...head, 'tasks: [slope]', 'curtains: [{ ceiling: 0.5 }]', 'methods: [scripted]');
  const cell = cellNamed(plan, 'slope', 'scripted', 1);
  const stage = setStage(plan, cell, toyCatalogue);
  const stream = rootStream(plan.seed).split('task', 'slope', canonicalJson(cell.task.settings), 1);
  const task = slope.make({ columns: 3, step: 0, shape: 'plain' }, stream.split('instance'));
  const pool = drawPool(task, 40, stream.split('pool'));

  test('shows the pool rows under the ceiling and none of the hidden ones', () => {
    const ordered = Float64Array.from(pool.scores).sort();
    const shown = Array.from({ length: 40 }, (_, i) => i).filter(
      (i) => pool.scores[i]! < (ordered[19]! + ordered[20]!) / 2,
    );
    expect(stage.designs.rows).toBe(20);
    const keys = Array.from({ length: 20 }, (_, i) => rowKey(stage.designs, i));
    expect(keys).toEqual(shown.map((i) => rowKey(pool.designs, i)));
    expect(Array.from(stage.scores)).toEqual(shown.map((i) => pool.scores[i]));
  });

  test('sets 0 at the worst of the whole pool and 1 at the optimum', () => {
    expect(stage.floor).toBe(Math.min(...pool.scores));
    expect(stage.top).toBe(task.optimum.value);
    expect(stage.topKnown).toBe('exact');
    expect(stage.normalize(stage.floor)).toBe(0);
    expect(stage.normalize(stage.top)).toBe(1);
    expect(stage.judge({ rows: 1, columns: 3, values: task.optimum.design! })).toEqual(Float64Array.of(1));
  });

  test('does not clip what lies beyond', () => {
    const range = stage.top - stage.floor;
    expect(stage.normalize(stage.top + range)).toBeCloseTo(2, 12);
    expect(stage.normalize(stage.floor - range)).toBeCloseTo(-1, 12);
  });

  test('takes best and worst visible from true scores, whatever the noise', () => {
    const noisy = toyPlan(
      ...head,
      'tasks: [slope]',
      'curtains: [{ ceiling: 0.5, noise: 3 }]',
      'methods: [scripted]',
    );
    const seen = setStage(noisy, cellNamed(noisy, 'slope', 'scripted', 1), toyCatalogue);
    expect(seen.scores).not.toEqual(stage.scores);
    expect(seen.bestVisible).toBe(stage.bestVisible);
    expect(seen.worstVisible).toBe(stage.worstVisible);
    expect(stage.bestVisible).toBe(Math.max(...stage.scores.map(stage.normalize)));
    expect(stage.worstVisible).toBe(0);
  });

  test('raises a best-known top to the best of the pool', () => {
    const modest = defineTaskFamily({
      ...slope,
      make: (settings, own) => {
        const { optimum, ...rest } = withoutDesign(slope.make(settings, own));
        return { ...rest, optimum: { ...optimum, value: optimum.value - 1e6 } };
      },
    });
    const seen = setStage(plan, cell, { tasks: [modest] });
    expect(seen.topKnown).toBe('best-known');
    expect(seen.top).toBe(Math.max(...pool.scores));
  });

  test('refuses a task on which nothing can be better', () => {
    const flat = toyPlan(
      ...head,
      'tasks: [{ task: slope, as: flat, settings: { step: 1000 } }]',
      'methods: [scripted]',
    );
    const make = () => setStage(flat, cellNamed(flat, 'flat', 'scripted', 1), { tasks: [allNought] });
    expect(make).toThrow(OnebatchError);
    expect(make).toThrow('task "flat": the whole pool scores 0, nothing can be better');
  });
});

const allNought = defineTaskFamily({
  ...slope,
  make: (settings, stream) => {
    const { space } = slope.make(settings, stream);
    return {
      space,
      truth: ({ rows }) => new Float64Array(rows),
      optimum: { value: 0, known: 'exact' as const },
    };
  },
});
