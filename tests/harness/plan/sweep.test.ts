import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { countCells, settingsHash } from '../../../harness/cells.js';
import { checkHalves, hasSweeps } from '../../../harness/plan/halves.js';
import { readPlan } from '../../../harness/plan/read.js';
import { labelVariants } from '../../../harness/plan/variant-label.js';
import { toyCatalogue } from '../toy-catalogue.js';
import { toyPlan } from '../toy-plan.js';

const tasks = 'tasks: [slope, blend]';

/** The lines that a plan with these methods is refused with. */
function refusal(...lines: string[]): string[] {
  try {
    readPlan([tasks, 'methods:', ...lines].join('\n'), 'p.yaml', toyCatalogue);
  } catch (error) {
    return (error as Error).message.split('\n');
  }
  throw new Error(`the plan was read:\n${lines.join('\n')}`);
}

describe('readPlan(text, …) with a sweep', () => {
  const plan = toyPlan(
    tasks,
    'methods:',
    '  - idle-best',
    '  - method: scripted',
    '    as: firm',
    '    sweep: { script: [good, late], search: { steps: [1, 2, 3] } }',
    '  - surrogate: ridge',
    '    search: genetic',
    '    settings: { search: { steps: 7 } }',
    '    sweep: { surrogate: { width: [4, 8] } }',
  );

  test('makes a method of every combination, the last setting changing fastest, in the place of the entry', () => {
    expect(plan.methods.map(({ label, sweep }) => [label, sweep])).toEqual([
      ['idle-best', undefined],
      ['firm(script=good,search.steps=1)', 'firm'],
      ['firm(script=good,search.steps=2)', 'firm'],
      ['firm(script=good,search.steps=3)', 'firm'],
      ['firm(script=late,search.steps=1)', 'firm'],
      ['firm(script=late,search.steps=2)', 'firm'],
      ['firm(script=late,search.steps=3)', 'firm'],
      ['ridge+genetic+none(surrogate.width=4)', 'ridge+genetic+none'],
      ['ridge+genetic+none(surrogate.width=8)', 'ridge+genetic+none'],
    ]);
    expect(plan.methods.at(5)!.settings).toEqual({ script: 'late', search: { steps: 2 } });
  });

  test('keeps the other settings, and fills in defaults', () => {
    expect(plan.methods.at(-1)).toMatchObject({
      method: { surrogate: 'ridge', search: 'genetic', caution: 'none' },
      settings: { surrogate: { width: 8 }, search: { steps: 7 }, caution: {} },
    });
  });

  test('runs each variant as the method with these settings would run alone', () => {
    const alone = toyPlan(
      tasks,
      'methods: [{ method: scripted, settings: { script: late, search: { steps: 2 } } }]',
    );
    expect(settingsHash(plan.methods.at(5)!)).toBe(settingsHash(alone.methods[0]!));
    expect(countCells(plan)).toBe(2 * 16 * 9);
  });

  test('chooses on seeds unless the plan says tasks', () => {
    expect(plan.choose).toEqual({ on: 'seeds' });
    const lines = [tasks, 'methods: [{ method: scripted, sweep: { script: [a, b] } }]'];
    expect(toyPlan(...lines, 'choose: {}').choose).toEqual({ on: 'seeds' });
    expect(toyPlan(...lines, 'choose: { on: tasks }').choose).toEqual({ on: 'tasks' });
  });

  test('a plan without a sweep says nothing of choosing', () => {
    const plain = toyPlan(tasks, 'methods: [scripted]');
    expect(Object.keys(plain)).not.toContain('choose');
    expect(Object.keys(plain.methods[0]!)).toEqual(['label', 'method', 'settings']);
    expect([hasSweeps(plain), hasSweeps(plan)]).toEqual([false, true]);
  });
});

describe('readPlan refuses a sweep, naming the line and the key,', () => {
  test.each<[string, string, string]>([
    ['of nothing', 'sweep: {}', 'sweep: names no setting; give one a list of values'],
    ['that is a list', 'sweep: [1, 2]', 'sweep: is [1,2], must be a group of keys'],
    [
      'of an empty group',
      'sweep: { search: {} }',
      'sweep.search: names no setting; give one a list of values',
    ],
    [
      'of a single value',
      'sweep: { search: { steps: [5] } }',
      'sweep.search.steps: is [5], must be a list of at least two different values',
    ],
    [
      'of a value that is no list',
      'sweep: { search: { steps: 5 } }',
      'sweep.search.steps: is 5, must be a list of at least two different values',
    ],
    [
      'with a value twice',
      'sweep: { search: { steps: [5, 6, 5.0] } }',
      'sweep.search.steps[2]: is 5 a second time; keep one',
    ],
    [
      'of a setting that has a value already',
      'settings: { search: { steps: 5 } }, sweep: { search: { steps: [5, 6] } }',
      'sweep.search.steps: stands in settings too; keep one of the two',
    ],
    [
      'of a group that has a value already',
      'settings: { search: { steps: 5 } }, sweep: { search: [{ steps: 1 }, { steps: 2 }] }',
      'sweep.search: stands in settings too; keep one of the two',
    ],
    [
      'with a value that the method refuses',
      'sweep: { script: [a, b], search: { steps: [5, -1, many] } }',
      'sweep.search.steps[1]: is -1, must be at least 0',
    ],
    [
      'of a misspelt setting',
      'sweep: { script: [a, b], search: { stepz: [5, 6] } }',
      'sweep.search.stepz: no such key; did you mean "steps"? There is: steps',
    ],
    [
      'of a misspelt group',
      'sweep: { serch: { steps: [5, 6] } }',
      'sweep.serch: no such key; did you mean "search"? There is: script, search',
    ],
    [
      'over a setting that is wrong itself',
      'settings: { search: { steps: -2 } }, sweep: { script: [a, b] }',
      'settings.search.steps: is -2, must be at least 0',
    ],
  ])('%s', (_, keys, message) => {
    const lines = refusal('  - idle-best', `  - { method: scripted, ${keys} }`);
    expect(lines.find((line) => !line.includes('"many"'))).toBe(`p.yaml:4: methods[1].${message}`);
    expect(lines).toHaveLength(keys.includes('many') ? 2 : 1);
  });

  test('telling a value at fault once, however many combinations hold it, at its own line', () => {
    expect(
      refusal(
        '  - method: scripted',
        '    sweep:',
        '      script: [a, b, c]',
        '      search:',
        '        steps:',
        '          - 1',
        '          - -1',
      ),
    ).toEqual(['p.yaml:9: methods[0].sweep.search.steps[1]: is -1, must be at least 0']);
  });

  test('with more than 200 combinations', () => {
    const list = (length: number): string => JSON.stringify(Array.from({ length }, (_, i) => i));
    const words = JSON.stringify(['a', 'b', 'c']);
    expect(
      refusal(`  - { method: scripted, sweep: { script: ${words}, search: { steps: ${list(67)} } } }`),
    ).toEqual([
      'p.yaml:3: methods[0].sweep: makes 201 combinations, at most 200 are allowed; give fewer settings or values',
    ]);
    expect(
      toyPlan(tasks, `methods: [{ method: scripted, sweep: { search: { steps: ${list(200)} } } }]`).methods,
    ).toHaveLength(200);
  });

  test('whose label another method has', () => {
    const swept = '  - { method: scripted, sweep: { script: [a, b] } }';
    expect(refusal('  - scripted', swept)).toEqual([
      'p.yaml:4: methods[1]: is the second one labelled "scripted"; give it a name of its own with "as"',
    ]);
    expect(refusal(swept, '  - { method: idle-best, as: scripted(script=b) }')).toEqual([
      'p.yaml:4: methods[1]: is the second one labelled "scripted(script=b)"; give it a name of its own with "as"',
    ]);
  });

  test('a choice where nothing is swept, and halves of what it does not know', () => {
    expect(refusal('  - scripted', 'choose: { on: tasks }')).toEqual([
      'p.yaml:4: choose: there is nothing to choose, as no method has a sweep',
    ]);
    expect(refusal('  - { method: scripted, sweep: { script: [a, b] } }', 'choose: { on: seed }')).toEqual([
      'p.yaml:4: choose.on: is "seed", must be one of these; did you mean "seeds"? There is: seeds, tasks',
    ]);
  });
});

describe('labelVariants(method, variants)', () => {
  const choose = (value: unknown) => [{ path: ['caution', 'target'], value }];

  test('writes numbers, words, lists and groups', () => {
    const values = [0.5, -1e-7, true, null, 'tanh', [32, 64], { a: 1, b: [2] }];
    expect(labelVariants('firm', values.map(choose))).toEqual([
      'firm(caution.target=0.5)',
      'firm(caution.target=-1e-7)',
      'firm(caution.target=true)',
      'firm(caution.target=null)',
      'firm(caution.target=tanh)',
      'firm(caution.target=(32,64))',
      'firm(caution.target=(a=1,b=(2)))',
    ]);
  });

  test('numbers variants that would have the same label, or one too long for a file', () => {
    expect(labelVariants('firm', ['a/b', 'a b'].map(choose))).toEqual(['firm(1)', 'firm(2)']);
    expect(labelVariants('firm', ['x'.repeat(90), 'y'].map(choose))).toEqual(['firm(1)', 'firm(2)']);
  });

  test('gives different labels of plain signs only, whatever the values', () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.jsonValue(), { minLength: 2, maxLength: 8, selector: JSON.stringify }),
        (values) => {
          const labels = labelVariants('firm', values.map(choose));
          expect(new Set(labels).size).toBe(values.length);
          for (const label of labels) expect(label).toMatch(/^[\w.+()=,-]{1,96}$/);
        },
      ),
    );
  });
});

describe('checkHalves(plan)', () => {
  const swept = 'methods: [{ method: scripted, as: firm, sweep: { script: [a, b] } }]';

  test('refuses halves of a single seed or task, and says what to add', () => {
    expect(() => checkHalves(toyPlan('seeds: 1', tasks, swept))).toThrow(
      'the sweep of firm is chosen on half of the seeds and reported on the other half, which takes 2 seeds, not 1; raise --seeds, or say --same-cells',
    );
    expect(() => checkHalves(toyPlan('tasks: [slope]', swept, 'choose: { on: tasks }'))).toThrow(
      'the sweep of firm is chosen on half of the tasks and reported on the other half, which takes 2 tasks, not 1; add a task, or choose on seeds, or say --same-cells',
    );
  });

  test('lets pass two seeds, two tasks with one seed, and any plan without a sweep', () => {
    checkHalves(toyPlan('seeds: 2', 'tasks: [slope]', swept));
    checkHalves(toyPlan('seeds: 1', tasks, swept, 'choose: { on: tasks }'));
    checkHalves(toyPlan('seeds: 1', 'tasks: [slope]', 'methods: [scripted]'));
  });
});
