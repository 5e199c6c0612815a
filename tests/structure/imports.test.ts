import { readdirSync, readFileSync } from 'node:fs';
import { join, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { findProblems, type Problem, rooms } from './import-rule.js';

const project = fileURLToPath(new URL('../..', import.meta.url));

function readSources(): Map<string, string> {
  const sources = new Map<string, string>();
  for (const room of rooms) {
    for (const name of readdirSync(join(project, room), { recursive: true, encoding: 'utf8' })) {
      if (!name.endsWith('.ts')) continue;
      sources.set(`${room}/${name.split(sep).join('/')}`, readFileSync(join(project, room, name), 'utf8'));
    }
  }
  return sources;
}

const problemsOf = (files: Record<string, string>): Problem[] => findProblems(new Map(Object.entries(files)));

describe('the project', () => {
  const sources = readSources();

  test('is read: files of every room that has any, the ground among them', () => {
    for (const file of ['harness/space.ts', 'harness/curtains/region.ts', 'methods/parts.ts']) {
      expect([...sources.keys()]).toContain(file);
    }
  });

  test('has no forbidden import, no circle, and no chance or clock where seeds rule', () => {
    expect(findProblems(sources)).toEqual([]);
  });
});

describe('findProblems(sources) on imports', () => {
  test.each([
    ['harness/cell.ts', "import { families } from '../tasks/index.js';", 'harness may not import tasks'],
    ['harness/plan/read.ts', "import { a } from '../../methods/a.js';", 'harness may not import methods'],
    ['harness/cell.ts', "import type { Row } from '../results/row.js';", 'harness may not import results'],
    [
      'methods/cautions/none.ts',
      "import { truth } from '../../tasks/nk.js';",
      'methods may not import tasks',
    ],
    ['methods/a.ts', "import type { Truth } from '../tasks/nk.js';", 'methods may not import tasks'],
    ['methods/a.ts', "export { truth } from '../tasks/nk.js';", 'methods may not import tasks'],
    ['methods/a.ts', "export * from '../tasks/nk.js';", 'methods may not import tasks'],
    ['methods/a.ts', "import '../tasks/nk.js';", 'methods may not import tasks'],
    ['methods/a.ts', "const nk = await import('../tasks/nk.js');", 'methods may not import tasks'],
    ['methods/a.ts', 'const nk = await import(`../tasks/nk.js`);', 'methods may not import tasks'],
    ['methods/a.ts', "type Truth = import('../tasks/nk.js').Truth;", 'methods may not import tasks'],
    ['methods/a.ts', "import nk = require('../tasks/nk.js');", 'methods may not import tasks'],
    ['methods/a.ts', "const nk = require('../tasks/nk.js');", 'methods may not import tasks'],
    [
      'methods/a.ts',
      "new Worker(new URL('../tasks/nk.js', import.meta.url));",
      'methods may not import tasks',
    ],
    ['methods/a.ts', "import { a } from './searches/../../tasks/nk.js';", 'methods may not import tasks'],
    ['tasks/nk.ts', "import { m } from '../methods/index.js';", 'tasks may not import methods'],
    ['results/page/page.ts', "import { m } from '../../methods/index.js';", 'results may not import methods'],
    ['results/ledger.ts', "import { m } from '../cli/main.js';", 'results may not import cli'],
    ['tasks/nk.ts', "import { m } from '../cli/main.js';", 'tasks may not import cli'],
    ['cli/main.ts', "import { m } from '../tests/harness/toy-task.js';", 'cli may not import tests'],
    ['methods/a.ts', "import { m } from '../package.json';", 'methods may not import package.json'],
    ['methods/a.ts', "import { nk } from 'onebatch/tasks/nk.js';", 'by a roundabout name'],
    ['methods/a.ts', "import { nk } from '#tasks/nk.js';", 'by a roundabout name'],
    ['methods/a.ts', "import { nk } from '/tasks/nk.js';", 'by a roundabout name'],
    ['methods/a.ts', "const nk = await import('../ta' + 'sks/nk.js');", 'worked out at run time'],
    ['methods/a.ts', "const name = '../tasks/nk.js'; await import(name);", 'methods may not import tasks'],
    ['methods/a.ts', 'const load = (name: string) => import(name);', 'worked out at run time'],
  ])('refuses in %s: %s', (file, source, problem) => {
    const problems = problemsOf({ [file]: source });
    expect(problems).toHaveLength(1);
    expect(problems[0]).toContain(file);
    expect(problems[0]).toContain(problem);
  });

  test.each([
    ['harness/curtain.ts', "import { a } from './curtains/region.js'; import { z } from 'zod';"],
    ['harness/curtains/region.ts', "import { a } from '../space.js';"],
    ['methods/searches/a.ts', "import { a } from '../parts.js'; import { b } from '../../harness/space.js';"],
    ['results/page/page.ts', "import { a } from '../../harness/row.js'; import { readFile } from 'node:fs';"],
    [
      'cli/main.ts',
      "import '../tasks/index.js'; import '../methods/index.js'; import '../results/ledger.js';",
    ],
    ['cli/main.ts', 'await import(path);'],
    ['methods/a.ts', "const name = 'some-package'; await import(name);"],
    ['methods/a.ts', "// import { truth } from '../tasks/nk.js';\nconst text = \"import '../tasks/nk.js'\";"],
    ['methods/a.ts', "const home = new URL('https://example.org/tasks');"],
  ])('allows in %s: %s', (file, source) => {
    expect(problemsOf({ [file]: source })).toEqual([]);
  });
});

describe('findProblems(sources) on circles', () => {
  test('names a circle once, wherever it is entered, types included', () => {
    const problems = problemsOf({
      'harness/c.ts': "import './a.js';",
      'harness/b.ts': "export * from './c.js';",
      'harness/a.ts': "import type { B } from './b.js';",
      'harness/outside.ts': "import './b.js';",
    });
    expect(problems).toEqual([
      'circle of imports: harness/a.ts → harness/b.ts → harness/c.ts → harness/a.ts',
    ]);
  });

  test('finds a file that imports itself, and two circles that share a file', () => {
    expect(problemsOf({ 'harness/a.ts': "import './a.js';" })).toHaveLength(1);
    const shared = problemsOf({
      'harness/a.ts': "import './b.js'; import './c.js';",
      'harness/b.ts': "import './a.js';",
      'harness/c.ts': "import './a.js';",
    });
    expect(shared).toHaveLength(2);
  });

  test('allows two roads to one file', () => {
    const problems = problemsOf({
      'harness/a.ts': "import './b.js'; import './c.js';",
      'harness/b.ts': "import './d.js';",
      'harness/c.ts': "import './d.js';",
      'harness/d.ts': '',
    });
    expect(problems).toEqual([]);
  });
});

describe('findProblems(sources) on chance and clocks', () => {
  const files = ['methods/searches/a.ts', 'tasks/a.ts', 'results/statistics/a.ts', 'harness/curtains/a.ts'];
  const ground = ['random', 'designs', 'space', 'encoding', 'pool', 'curtain'].map(
    (name) => `harness/${name}.ts`,
  );

  test.each([...files, ...ground])('refuses Math.random() in %s', (file) => {
    expect(problemsOf({ [file]: 'const u = Math.random();' })).toEqual([`${file} uses Math.random`]);
  });

  test.each([
    ['const now = Date.now();', 'Date.now'],
    ['const now = performance.now();', 'performance.now'],
    ['const now = new Date();', 'Date()'],
    ['const now = new Date(0);', 'Date()'],
    ['const now = Date();', 'Date()'],
    ["const u = Math['random']();", 'Math.random'],
    ['const u = globalThis.Math.random();', 'globalThis.Math.random'],
    ['const draw = Math.random;', 'Math.random'],
    ['const { random } = Math;', 'Math under another name'],
    ['const Clock = Date;', 'Date under another name'],
    ['const now = process.hrtime.bigint();', 'process.hrtime'],
    ['const id = crypto.randomUUID();', 'crypto.randomUUID'],
    ["import { randomBytes } from 'node:crypto';", 'node:crypto'],
    ["import { performance as p } from 'node:perf_hooks';", 'node:perf_hooks'],
  ])('refuses %s', (source, use) => {
    expect(problemsOf({ 'methods/a.ts': source })).toEqual([`methods/a.ts uses ${use}`]);
  });

  test.each(['harness/crew.ts', 'cli/progress.ts', 'results/ledger.ts'])('allows a clock in %s', (file) => {
    expect(problemsOf({ [file]: 'const now = Date.now();' })).toEqual([]);
  });

  test.each([
    '// Math.random() is banned',
    "const text = 'Date.now()';",
    "import { createHash } from 'node:crypto';",
    'const top = Math.max(1, 2);',
    'type D = Date;',
  ])('allows %s', (source) => {
    expect(problemsOf({ 'methods/a.ts': source })).toEqual([]);
  });
});
