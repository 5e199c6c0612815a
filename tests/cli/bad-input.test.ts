import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { onebatch } from './program.js';

let root: string;
beforeAll(async () => {
  root = await mkdtemp(join(tmpdir(), 'onebatch-test-'));
});
afterAll(() => rm(root, { recursive: true, force: true }));

describe.concurrent('bad input gets one clear line, exit code 2, and nothing is written:', () => {
  const plan = (...lines: string[]) => ['tasks: [branin]', 'methods: [jitter]', ...lines].join('\n');

  test.each<[string, string, string[], string | RegExp]>([
    [
      'a misspelt task',
      'tasks: [brannin]\nmethods: [jitter]',
      [],
      /^p\.yaml:1: tasks\[0\]\.task: no task is named "brannin"; did you mean "branin"\? There is: branin, .+\n$/,
    ],
    [
      'a negative seed count in the plan',
      plan('seeds: -2'),
      [],
      'p.yaml:3: seeds: is -2, must be at least 1\n',
    ],
    [
      'a negative seed count on the command line',
      plan(),
      ['--seeds', '-2'],
      '--seeds: is "-2", must be a whole number from 1 to 100000\n',
    ],
    [
      'a settings key that does not exist',
      'tasks: [branin]\nmethods: [{ method: jitter, settings: { stepp: 1 } }]',
      [],
      'p.yaml:2: methods[0].settings.stepp: no such key; did you mean "step"? There is: parents, step, changes\n',
    ],
    [
      'settings that contradict each other',
      'tasks: [{ task: ising, settings: { length: 4, range: 4 } }]\nmethods: [jitter]',
      [],
      /^ising: range must be at most length − 1 = 3, got 4; .+\n$/,
    ],
    ['a file of random bytes', '\u0000\u0007{[\uFFFD', [], /^p\.yaml:1: .+\n$/],
    [
      'an option that does not exist',
      plan(),
      ['--sedes', '3'],
      'unknown argument "sedes"; did you mean "--seeds"?\n',
    ],
    ['an option without its value', plan(), ['--out'], '--out needs a value; see onebatch --help\n'],
    [
      'an output folder that is a file',
      plan(),
      ['--out', 'p.yaml'],
      "p.yaml: can't be used as output folder (EEXIST)\n",
    ],
  ])('%s', async (_, text, words, line) => {
    const folder = await mkdtemp(join(root, 'bad-'));
    await writeFile(join(folder, 'p.yaml'), text);
    const ending = await onebatch(folder, ['rehearse', 'p.yaml', ...words]);
    expect(ending).toEqual({
      code: 2,
      signal: null,
      stdout: '',
      stderr: typeof line === 'string' ? line : expect.stringMatching(line),
    });
    expect(await readdir(folder)).toEqual(['p.yaml']);
    expect(await readFile(join(folder, 'p.yaml'), 'utf8')).toBe(text);
  });

  test.each<[string, string[], string]>([
    [
      'a plan that is not there',
      ['rehearse', 'none.yaml'],
      'none.yaml: there is no such plan file; check the path, or leave it out to run the demo\n',
    ],
    ['a folder as a plan', ['rehearse', 'folder'], 'folder: is a folder; name a plan file\n'],
    ['no command', [], 'name a command; see onebatch --help\n'],
    [
      'a command that does not exist',
      ['rehears'],
      'there is no command "rehears"; did you mean "rehearse"? There is: rehearse, compare, guard, list\n',
    ],
    [
      'a section that does not exist',
      ['list', 'taks'],
      'no section is named "taks"; did you mean "tasks"? There is: tasks, methods, surrogates, searches, cautions\n',
    ],
  ])('%s', async (_, words, line) => {
    const folder = await mkdtemp(join(root, 'bad-'));
    await mkdir(join(folder, 'folder'));
    expect(await onebatch(folder, words)).toEqual({ code: 2, signal: null, stdout: '', stderr: line });
    expect(await readdir(folder)).toEqual(['folder']);
  });
});
