import { describe, expect, test } from 'vitest';
import { OnebatchError } from '../../../harness/errors.js';
import { readPlan } from '../../../harness/plan/read.js';
import { toyCatalogue } from '../toy-catalogue.js';
import { toyPlan } from '../toy-plan.js';

const keys =
  'name, seed, methodSeed, seeds, pool, batch, budgetSeconds, backend, keep, tasks, curtains, methods, choose';
const good = { tasks: 'tasks: [slope]', methods: 'methods: [scripted]' };

/** The lines that a plan is refused with. */
function refusal(...lines: string[]): string[] {
  try {
    readPlan(lines.join('\n'), 'p.yaml', toyCatalogue);
  } catch (error) {
    expect(error).toBeInstanceOf(OnebatchError);
    expect((error as OnebatchError).code).toBe('bad-plan');
    return (error as OnebatchError).message.split('\n');
  }
  throw new Error(`the plan was read:\n${lines.join('\n')}`);
}

describe('readPlan reads', () => {
  test('the shortest plan, with every default filled in', () => {
    expect(toyPlan(good.tasks, good.methods)).toEqual({
      name: 'toy',
      seed: 1,
      seeds: 16,
      pool: 2000,
      batch: 128,
      budgetSeconds: 300,
      backend: 'kernel',
      keep: [],
      tasks: [
        {
          label: 'slope',
          family: 'slope',
          settings: { columns: 3, step: 0, shape: 'plain' },
          curtains: [{}],
        },
      ],
      methods: [
        { label: 'scripted', method: 'scripted', settings: { script: 'good', search: { steps: 10 } } },
      ],
    });
  });

  test('every key at the top', () => {
    const written = {
      name: 'n',
      seed: 0,
      seeds: 2,
      pool: 10,
      batch: 1,
      budgetSeconds: 0.5,
      backend: 'tfjs-node',
      keep: ['traces', 'batches'],
    };
    const lines = Object.entries(written).map(([key, value]) => `${key}: ${JSON.stringify(value)}`);
    expect(toyPlan(...lines, good.tasks, good.methods)).toMatchObject(written);
  });

  test.each([
    ['farm.plan.yaml', 'farm'],
    ['some/where/farm.yml', 'farm'],
    ['C:\\plans\\farm.plan.yml', 'farm'],
    ['my farm!.yaml', 'my-farm-'],
    ['.yaml', 'plan'],
  ])('a plan without a name in %s as one named "%s"', (file, name) => {
    expect(readPlan(`${good.tasks}\n${good.methods}`, file, toyCatalogue).name).toBe(name);
  });

  test('a word alone as the entry that names a task or a method', () => {
    const short = toyPlan('tasks: [slope, blend]', 'methods: [scripted, idle-best]');
    const long = toyPlan(
      'tasks: [{ task: slope }, { task: blend }]',
      'methods: [{ method: scripted }, { method: idle-best }]',
    );
    expect(short).toEqual(long);
  });

  test('JSON, which YAML contains', () => {
    expect(toyPlan(JSON.stringify({ tasks: ['slope'], methods: ['scripted'] }))).toEqual(
      toyPlan(good.tasks, good.methods),
    );
  });

  test('"as" as the label, and without one the task with the settings that were written', () => {
    const { tasks } = toyPlan(
      'tasks:',
      '  - slope',
      '  - { task: slope, settings: { step: 1, columns: 2 } }',
      '  - { task: slope, as: mine }',
      good.methods,
    );
    expect(tasks.map(({ label }) => label)).toEqual(['slope', 'slope(step=1,columns=2)', 'mine']);
  });

  test('curtains at the top for tasks that bring none of their own', () => {
    const { tasks } = toyPlan(
      'tasks: [slope, { task: blend, curtains: [{ thin: 5 }, {}] }]',
      'curtains: [{ ceiling: 0.5 }]',
      good.methods,
    );
    expect(tasks.map(({ curtains }) => curtains)).toEqual([[{ ceiling: 0.5 }], [{ thin: 5 }, {}]]);
  });

  test("the defaults of a curtain's parts", () => {
    const { tasks } = toyPlan(good.tasks, 'curtains: [{ family: {}, region: {} }]', good.methods);
    expect(tasks[0]!.curtains).toEqual([
      { family: { parents: 3, changes: 2 }, region: { columns: 2, share: 0.4, around: 'random' } },
    ]);
  });

  test('a method of parts, without a caution when none is named', () => {
    const { methods } = toyPlan(
      good.tasks,
      'methods:',
      '  - { surrogate: ridge, search: genetic, settings: { search: { steps: 3 } } }',
      '  - { surrogate: network, search: ascent, caution: lower-bound, as: mine }',
    );
    expect(methods).toEqual([
      {
        label: 'ridge+genetic+none',
        method: { surrogate: 'ridge', search: 'genetic', caution: 'none' },
        settings: { surrogate: { width: 8 }, search: { steps: 3 }, caution: {} },
      },
      {
        label: 'mine',
        method: { surrogate: 'network', search: 'ascent', caution: 'lower-bound' },
        settings: { surrogate: { width: 8 }, search: { steps: 10 }, caution: {} },
      },
    ]);
  });

  test('anchors, aliases and merged keys', () => {
    const plan = toyPlan(
      'tasks:',
      '  - &first { task: slope, settings: &s { columns: 4 }, as: one }',
      '  - { <<: *first, as: two }',
      '  - { task: slope, settings: *s, as: three }',
      good.methods,
    );
    expect(plan.tasks.map(({ settings }) => settings['columns'])).toEqual([4, 4, 4]);
  });
});

describe('readPlan refuses, naming the line, the key and the nearest word,', () => {
  test.each<[string, string[], string]>([
    [
      'a misspelt task',
      ['methods: [scripted]', 'tasks:', '  - blend', '  - slop'],
      'p.yaml:4: tasks[1].task: no task is named "slop"; did you mean "slope"? There is: slope, blend',
    ],
    [
      'a misspelt task in the long form',
      ['methods: [scripted]', 'tasks:', '  - settings: {}', '    task: blent'],
      'p.yaml:4: tasks[0].task: no task is named "blent"; did you mean "blend"? There is: slope, blend',
    ],
    [
      'a misspelt method',
      ['tasks: [slope]', 'methods:', '  - scriptd'],
      'p.yaml:3: methods[0].method: no method is named "scriptd"; did you mean "scripted"? There is: scripted, idle-best',
    ],
    [
      'a misspelt surrogate',
      ['tasks: [slope]', 'methods:', '  - surrogate: netwrk', '    search: genetic'],
      'p.yaml:3: methods[0].surrogate: no surrogate is named "netwrk"; did you mean "network"? There is: network, network-ensemble, ridge',
    ],
    [
      'a misspelt search',
      ['tasks: [slope]', 'methods:', '  - surrogate: ridge', '    search: genetics'],
      'p.yaml:4: methods[0].search: no search is named "genetics"; did you mean "genetic"? There is: ascent, genetic',
    ],
    [
      'a misspelt caution',
      [
        'tasks: [slope]',
        'methods:',
        '  - { surrogate: ridge, search: genetic,',
        '      caution: lowerbound }',
      ],
      'p.yaml:4: methods[0].caution: no caution is named "lowerbound"; did you mean "lower-bound"? There is: none, lower-bound',
    ],
    [
      'a misspelt setting of a task, at its own line and not that of its value',
      ['tasks:', '  - task: slope', '    settings:', '      colums:', '        5', 'methods: [scripted]'],
      'p.yaml:4: tasks[0].settings.colums: no such key; did you mean "columns"? There is: columns, step, shape',
    ],
    [
      'a misspelt setting deep inside a method',
      ['tasks: [slope]', 'methods:', '  - method: scripted', '    settings: { search: { stepz: 5 } }'],
      'p.yaml:4: methods[0].settings.search.stepz: no such key; did you mean "steps"? There is: steps',
    ],
    [
      'a setting of a method that takes none',
      ['tasks: [slope]', 'methods: [{ method: idle-best, settings: { steps: 5 } }]'],
      'p.yaml:2: methods[0].settings.steps: no such key; there is none',
    ],
    [
      'a misspelt key at the top',
      ['sedes: 5', good.tasks, good.methods],
      `p.yaml:1: sedes: no such key; did you mean "seed"? There is: ${keys}`,
    ],
    [
      'a misspelt key of an entry',
      ['tasks:', '  - task: slope', '    curtain:', '      - {}', good.methods],
      'p.yaml:3: tasks[0].curtain: no such key; did you mean "curtains"? There is: task, as, settings, curtains',
    ],
    [
      'a misspelt key of a curtain',
      [good.tasks, good.methods, 'curtains:', '  - noise: 0.1', '    cieling: 0.5'],
      'p.yaml:5: curtains[0].cieling: no such key; did you mean "ceiling"? There is: ceiling, region, family, thin, noise',
    ],
    [
      "a misspelt key of a task's own curtain",
      ['tasks: [{ task: slope, curtains: [{ thinn: 5 }] }]', good.methods],
      'p.yaml:1: tasks[0].curtains[0].thinn: no such key; did you mean "thin"? There is: ceiling, region, family, thin, noise',
    ],
    [
      'a misspelt key of a family',
      [good.tasks, good.methods, 'curtains: [{ family: { parnts: 1 } }]'],
      'p.yaml:3: curtains[0].family.parnts: no such key; did you mean "parents"? There is: parents, changes',
    ],
    [
      'a misspelt key of a region',
      [good.tasks, good.methods, 'curtains: [{ region: { share: 0.5, colums: 1 } }]'],
      'p.yaml:3: curtains[0].region.colums: no such key; did you mean "columns"? There is: where, columns, share, around',
    ],
    [
      'a misspelt word of a setting',
      ['tasks: [{ task: slope, settings: { shape: steap } }]', good.methods],
      'p.yaml:1: tasks[0].settings.shape: is "steap", must be one of these; did you mean "steep"? There is: plain, steep',
    ],
    [
      'an unknown backend',
      ['backend: wsm', good.tasks, good.methods],
      'p.yaml:1: backend: is "wsm", must be one of these; did you mean "wasm"? There is: kernel, wasm, tfjs-node',
    ],
    [
      'an unknown thing to keep',
      ['keep:', '  - traces', '  - batch', good.tasks, good.methods],
      'p.yaml:3: keep[1]: is "batch", must be one of these; did you mean "batches"? There is: batches, traces',
    ],
  ])('%s', (_, lines, message) => {
    expect(refusal(...lines)).toEqual([message]);
  });
});

describe('readPlan refuses, saying the value seen and what it must be,', () => {
  test.each<[string, string]>([
    ['seed: -1', 'seed: is -1, must be at least 0'],
    ['seed: 1e300', 'seed: is 1e+300, must be at most 9007199254740991'],
    ['seed: .inf', 'seed: is Infinity, must be a number'],
    ['seeds: -3', 'seeds: is -3, must be at least 1'],
    ['seeds: 0', 'seeds: is 0, must be at least 1'],
    ['seeds: 1.5', 'seeds: is 1.5, must be a whole number'],
    ['seeds: many', 'seeds: is "many", must be a number'],
    ['seeds: .nan', 'seeds: is NaN, must be a number'],
    ['seeds: 1000000', 'seeds: is 1000000, must be at most 100000'],
    ['seeds:', 'seeds: is empty, must be a number'],
    ['seeds: [1, 2]', 'seeds: is [1,2], must be a number'],
    ['pool: 9', 'pool: is 9, must be at least 10'],
    ['batch: 0', 'batch: is 0, must be at least 1'],
    ['batch: "8"', 'batch: is "8", must be a number'],
    ['budgetSeconds: 0', 'budgetSeconds: is 0, must be more than 0'],
    ['budgetSeconds: 1e9', 'budgetSeconds: is 1000000000, must be at most 1000000'],
    ['backend: 3', 'backend: is 3, must be one of these; there is: kernel, wasm, tfjs-node'],
    ['keep: traces', 'keep: is "traces", must be a list'],
    ['name: a b', 'name: is "a b": use letters, digits and . _ + - ( ) = , only, at most 48 characters'],
    ['name: 5', 'name: is 5, must be a word'],
    ['curtains: []', 'curtains: needs at least 1 entry'],
    ['curtains: {}', 'curtains: is {}, must be a list'],
    ['curtains: [5]', 'curtains[0]: is 5, must be a group of keys'],
    ['curtains: [{ ceiling: 1.5 }]', 'curtains[0].ceiling: is 1.5, must be less than 1'],
    ['curtains: [{ ceiling: 0 }]', 'curtains[0].ceiling: is 0, must be more than 0'],
    ['curtains: [{}, { thin: 1 }]', 'curtains[1].thin: is 1, must be at least 2'],
    ['curtains: [{ noise: -0.1 }]', 'curtains[0].noise: is -0.1, must be at least 0'],
    ['curtains: [{ family: { parents: 0 } }]', 'curtains[0].family.parents: is 0, must be at least 1'],
  ])('%s', (line, message) => {
    expect(refusal(line, good.tasks, good.methods)).toEqual([`p.yaml:1: ${message}`]);
  });

  test.each<[string, string]>([
    ['tasks: []', 'tasks: needs at least 1 entry'],
    ['tasks: slope', 'tasks: is "slope", must be a list'],
    ['tasks:', 'tasks: is empty, must be a list'],
    ['tasks: [5]', 'tasks[0]: is 5, must be a group of keys'],
    ['tasks: [{ task: 5 }]', 'tasks[0].task: is 5, must be a word'],
    ['tasks: [{ as: mine }]', 'tasks[0].task: is missing'],
    [
      'tasks: [{ task: slope, as: "" }]',
      'tasks[0].as: is "": use letters, digits and . _ + - ( ) = , only, at most 48 characters',
    ],
    ['tasks: [{ task: slope, settings: 5 }]', 'tasks[0].settings: is 5, must be a group of keys'],
    ['tasks: [{ task: slope, curtains: [] }]', 'tasks[0].curtains: needs at least 1 entry'],
    [
      'tasks: [{ task: slope, settings: { columns: 99 } }]',
      'tasks[0].settings.columns: is 99, must be at most 50',
    ],
    [
      'tasks: [{ task: slope, settings: { columns: three } }]',
      'tasks[0].settings.columns: is "three", must be a number',
    ],
  ])('%s', (line, message) => {
    expect(refusal(line, good.methods)).toEqual([`p.yaml:1: ${message}`]);
  });

  test.each<[string, string]>([
    ['methods: []', 'methods: needs at least 1 entry'],
    [
      'methods: [{ as: mine }]',
      'methods[0]: needs either "method", or "surrogate" and "search" (and "caution")',
    ],
    [
      'methods: [{ surrogate: ridge }]',
      'methods[0]: needs either "method", or "surrogate" and "search" (and "caution")',
    ],
    [
      'methods: [{ method: scripted, search: genetic }]',
      'methods[0]: names the method "scripted" and parts of its own; keep one of the two',
    ],
    [
      'methods: [{ method: scripted, settings: { search: { steps: -1 } } }]',
      'methods[0].settings.search.steps: is -1, must be at least 0',
    ],
    [
      'methods: [{ surrogate: ridge, search: genetic, settings: { surrogate: { width: a } } }]',
      'methods[0].settings.surrogate.width: is "a", must be a number',
    ],
  ])('%s', (line, message) => {
    expect(refusal(line, good.tasks)).toEqual([`p.yaml:1: ${message}`]);
  });

  test('a missing list', () => {
    expect(refusal('name: a', good.methods)).toEqual(['p.yaml:1: tasks: is missing']);
    expect(refusal('', good.tasks)).toEqual(['p.yaml:1: methods: is missing']);
  });

  test('a long value cut short', () => {
    const [line] = refusal(`backend: ${'x'.repeat(500)}`, good.tasks, good.methods);
    expect(line!.length).toBeLessThan(150);
  });

  test('every problem of a kind, a line each', () => {
    expect(refusal('seed: -1', 'tasks: [5]', 'methods: []', 'pool: a')).toEqual([
      'p.yaml:1: seed: is -1, must be at least 0',
      'p.yaml:4: pool: is "a", must be a number',
      'p.yaml:2: tasks[0]: is 5, must be a group of keys',
      'p.yaml:3: methods: needs at least 1 entry',
    ]);
    expect(refusal('tasks: [slop,', '  blnd]', 'methods:', '  - scriptd', '  - idle-worst')).toEqual([
      expect.stringMatching(/^p\.yaml:1: tasks\[0\]\.task: no task is named "slop"/),
      expect.stringMatching(/^p\.yaml:2: tasks\[1\]\.task: no task is named "blnd"/),
      expect.stringMatching(/^p\.yaml:4: methods\[0\]\.method: no method is named "scriptd"/),
      expect.stringMatching(/^p\.yaml:5: methods\[1\]\.method: no method is named "idle-worst"/),
    ]);
  });
});

describe('readPlan refuses what would stand twice:', () => {
  test('a label', () => {
    expect(
      refusal('tasks: [slope,', ' { task: slope, as: slope }]', 'methods: [scripted, scripted]'),
    ).toEqual([
      'p.yaml:2: tasks[1]: is the second one labelled "slope"; give it a name of its own with "as"',
      'p.yaml:3: methods[1]: is the second one labelled "scripted"; give it a name of its own with "as"',
    ]);
  });

  test('a curtain, however it is written', () => {
    expect(refusal(good.tasks, good.methods, 'curtains: [{}, { noise: 0 }]')).toEqual([
      'p.yaml:3: curtains[1]: is the second curtain "open"; keep one of the two',
    ]);
    expect(refusal('tasks: [{ task: slope, curtains: [{ thin: 5 }, { thin: 5 }] }]', good.methods)).toEqual([
      'p.yaml:1: tasks[0].curtains[1]: is the second curtain "thin=5"; keep one of the two',
    ]);
  });

  test('a key', () => {
    expect(refusal('seed: 1', 'seed: 2')).toEqual([
      'p.yaml:2: column 1: not readable as YAML: Map keys must be unique',
    ]);
  });
});

describe('readPlan refuses a file that is no plan:', () => {
  test.each<[string, string, string]>([
    ['an unclosed list', 'seed: 1\ntasks: [slope', 'p.yaml:2: column 14: not readable as YAML: '],
    ['a tab', 'tasks:\n\t- slope', 'p.yaml:2: column 1: not readable as YAML: Tabs'],
    [
      'two documents',
      'a: 1\n---\nb: 2',
      'p.yaml:2: column 1: not readable as YAML: Source contains multiple',
    ],
    ['a list', '- slope', 'p.yaml:1: the plan: is ["slope"], must be a group of keys'],
    ['a word', 'slope', 'p.yaml:1: the plan: is "slope", must be a group of keys'],
    ['an unknown alias', 'tasks: *x', 'p.yaml: not readable as YAML: Unresolved alias'],
    [
      'an anchor inside itself',
      'tasks: &a [*a]',
      'p.yaml: not readable as YAML: an anchor stands inside itself',
    ],
    [
      'anchors that grow without end',
      [
        'a: &a [1,1,1,1,1,1,1,1,1,1]',
        ...[...'bcdef'].map((key, i) => `${key}: &${key} [${`*${'abcde'[i]},`.repeat(10)}]`),
      ].join('\n'),
      'p.yaml: not readable as YAML: Excessive alias count',
    ],
    [
      'a key that is a list',
      '? [a, b]\n: 1\ntasks: [slope]\nmethods: [scripted]',
      'p.yaml:1: "[ a, b ]": no such key',
    ],
    ['an empty key', '? \n: 1\ntasks: [slope]\nmethods: [scripted]', 'p.yaml:1: "": no such key'],
    ['__proto__', '__proto__: 1\ntasks: [slope]\nmethods: [scripted]', 'p.yaml:1: __proto__: no such key'],
  ])('%s', (_, text, start) => {
    const lines = refusal(text);
    expect(lines).toHaveLength(1);
    expect(lines[0]!.slice(0, start.length)).toBe(start);
  });

  test.each([
    ['an empty one', ''],
    ['one with a comment only', '# nothing yet\n'],
  ])('%s', (_, text) => {
    expect(refusal(text)).toEqual(['p.yaml:1: tasks: is missing', 'p.yaml:1: methods: is missing']);
  });
});
