import { createHash } from 'node:crypto';
import { readdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { canonicalJson } from '../../harness/canonical.js';
import type { Plan } from '../../harness/plan/plan.js';
import {
  differences,
  manifestName,
  type Provenance,
  readManifest,
  writeManifest,
} from '../../results/manifest.js';
import { withFolder } from './temporary-folder.js';

const plan: Plan = {
  name: 'p',
  seed: 1,
  seeds: 4,
  pool: 100,
  batch: 8,
  budgetSeconds: 60,
  backend: 'wasm',
  keep: ['batches'],
  tasks: [{ label: 'ackley', family: 'ackley', settings: { dimensions: 3 }, curtains: [{ ceiling: 0.5 }] }],
  methods: [{ label: 'jitter', method: 'jitter', settings: { step: 0.05 } }],
};
const provenance: Provenance = { plan, program: '0.1.0', node: 'v20.0.0', backend: 'tfjs 4.22.0 on wasm' };

describe('a manifest', () => {
  test('gives back what was written', () =>
    withFolder(async (folder) => {
      await writeManifest(folder, provenance);
      expect(await readManifest(folder)).toEqual(provenance);
      expect(await readdir(folder)).toEqual([manifestName]);
    }));

  test('holds each part with its SHA-256', () =>
    withFolder(async (folder) => {
      await writeManifest(folder, provenance);
      const written = JSON.parse(await readFile(join(folder, manifestName), 'utf8')) as Record<
        string,
        { sha256: string; value: unknown }
      >;
      expect(Object.keys(written)).toEqual(['plan', 'program', 'node', 'backend']);
      for (const { sha256, value } of Object.values(written)) {
        expect(sha256).toBe(createHash('sha256').update(canonicalJson(value)).digest('hex'));
      }
    }));

  test('is undefined where there is none', () =>
    withFolder(async (folder) => {
      expect(await readManifest(folder)).toBeUndefined();
    }));

  test.each(['', '{"plan": {', 'null', '{}', '{"plan": 3}'])('that reads %j is refused as damaged', (text) =>
    withFolder(async (folder) => {
      await writeFile(join(folder, manifestName), text);
      await expect(readManifest(folder)).rejects.toThrow(
        `${join(folder, manifestName)}: is damaged; rehearse into a new folder with --out`,
      );
    }),
  );
});

describe('differences', () => {
  const changed = (change: Partial<Plan>) =>
    differences(provenance, { ...provenance, plan: { ...plan, ...change } });

  test('are none between a value and itself, in whatever order its keys stand', () => {
    expect(differences(provenance, JSON.parse(canonicalJson(provenance)))).toEqual([]);
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        expect(differences(value, structuredClone(value))).toEqual([]);
      }),
    );
  });

  test('are some between values that differ', () => {
    fc.assert(
      fc.property(fc.jsonValue(), fc.jsonValue(), (a, b) => {
        expect(differences(a, b).length > 0).toBe(canonicalJson(a) !== canonicalJson(b));
      }),
    );
  });

  test.each<[Partial<Plan>, string[]]>([
    [{ seeds: 5 }, ['plan.seeds: 4 -> 5']],
    [{ name: 'q', batch: 9 }, ['plan.name: "p" -> "q"', 'plan.batch: 8 -> 9']],
    [{ keep: [] }, ['plan.keep[0]: "batches" -> nothing']],
    [
      { tasks: [{ ...plan.tasks[0]!, settings: { dimensions: 4 } }] },
      ['plan.tasks[0].settings.dimensions: 3 -> 4'],
    ],
    [
      { tasks: [{ ...plan.tasks[0]!, curtains: [{ ceiling: 0.5, thin: 9 }] }] },
      ['plan.tasks[0].curtains[0].thin: nothing -> 9'],
    ],
    [
      { methods: [...plan.methods, { label: 'b', method: 'b', settings: {} }] },
      ['plan.methods[1]: nothing -> {"label":"b","method":"b","settings":{}}'],
    ],
    [
      { methods: [{ ...plan.methods[0]!, method: { surrogate: 'a', search: 'b', caution: 'c' } }] },
      ['plan.methods[0].method: "jitter" -> {"surrogate":"a","search":"b","caution":"c"}'],
    ],
  ])('of a plan with %j', (change, lines) => {
    expect(changed(change)).toEqual(lines);
  });

  test('name the program, the Node version and the backend', () => {
    expect(differences(provenance, { ...provenance, program: '0.2.0', node: 'v22.0.0' })).toEqual([
      'program: "0.1.0" -> "0.2.0"',
      'node: "v20.0.0" -> "v22.0.0"',
    ]);
  });

  test('cut long values short', () => {
    const [line] = changed({ name: 'x'.repeat(200) });
    expect(line!.length).toBeLessThan(90);
  });
});
