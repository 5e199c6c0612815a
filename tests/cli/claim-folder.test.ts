import { mkdir, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { claimFolder } from '../../cli/claim-folder.js';
import { OnebatchError } from '../../harness/errors.js';
import { ledgerName } from '../../results/ledger.js';
import { manifestName, type Provenance, readManifest } from '../../results/manifest.js';
import { toyPlan } from '../harness/toy-plan.js';
import { withFolder } from '../results/temporary-folder.js';

const plan = toyPlan('tasks: [slope, blend]', 'methods: [scripted]');
const provenance: Provenance = { plan, program: '0.1.0', node: 'v20.0.0', backend: 'tfjs 4 on wasm' };

async function refusal(folder: string, claim: Provenance): Promise<string> {
  const error = await claimFolder(folder, claim).then(
    () => undefined,
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(OnebatchError);
  return (error as Error).message.replace(folder, 'out');
}

describe('claimFolder', () => {
  test('makes the folder, with those above it, and writes its manifest', () =>
    withFolder(async (root) => {
      const folder = join(root, 'a', 'b');
      await claimFolder(folder, provenance);
      expect(await readManifest(folder)).toEqual(provenance);
    }));

  test('takes a folder that holds other files', () =>
    withFolder(async (folder) => {
      await writeFile(join(folder, 'notes.txt'), 'mine');
      await claimFolder(folder, provenance);
      expect((await readdir(folder)).sort()).toEqual([manifestName, 'notes.txt']);
    }));

  test('takes the folder of the same rehearsal again and changes nothing', () =>
    withFolder(async (folder) => {
      await claimFolder(folder, provenance);
      const before = await readFile(join(folder, manifestName), 'utf8');
      await claimFolder(folder, structuredClone(provenance));
      expect(await readFile(join(folder, manifestName), 'utf8')).toBe(before);
    }));

  test.each<[string, Provenance, string]>([
    ['seeds', { ...provenance, plan: { ...plan, seeds: 3 } }, 'plan.seeds: 16 -> 3'],
    [
      'a setting',
      { ...provenance, plan: changedSetting() },
      'plan.methods[0].settings.script: "good" -> "bad"',
    ],
    ['the program', { ...provenance, program: '0.2.0' }, 'program: "0.1.0" -> "0.2.0"'],
    ['Node', { ...provenance, node: 'v22.0.0' }, 'node: "v20.0.0" -> "v22.0.0"'],
    [
      'the backend',
      { ...provenance, backend: 'tfjs 5 on wasm' },
      'backend: "tfjs 4 on wasm" -> "tfjs 5 on wasm"',
    ],
    [
      'more than is worth showing',
      {
        ...provenance,
        plan: { ...plan, name: 'b', seed: 2, seeds: 3, pool: 11, batch: 5, keep: ['traces'] },
      },
      'plan.name: "toy" -> "b"; plan.seed: 1 -> 2; plan.seeds: 16 -> 3; plan.pool: 2000 -> 11; and 2 more',
    ],
  ])('refuses a folder when %s changed, saying what, and leaves it alone', (_, claim, what) =>
    withFolder(async (folder) => {
      await claimFolder(folder, provenance);
      expect(await refusal(folder, claim)).toBe(
        `out holds a rehearsal of something else (${what}); name a new folder with --out, or remove this one`,
      );
      expect(await readManifest(folder)).toEqual(provenance);
    }),
  );

  test('refuses a ledger without a manifest', () =>
    withFolder(async (folder) => {
      await writeFile(join(folder, ledgerName), 'task\n');
      expect(await refusal(folder, provenance)).toBe(
        'out holds a ledger without a manifest; name a new folder with --out, or remove this one',
      );
      expect(await readdir(folder)).toEqual([ledgerName]);
    }));

  test('refuses a damaged manifest', () =>
    withFolder(async (folder) => {
      await writeFile(join(folder, manifestName), '{');
      expect(await refusal(folder, provenance)).toBe(
        `out/${manifestName}: is damaged; rehearse into a new folder with --out`,
      );
    }));

  test('refuses a file, and a place below a file', () =>
    withFolder(async (root) => {
      const file = join(root, 'file');
      await writeFile(file, '');
      expect(await refusal(file, provenance)).toBe("out: can't be used as output folder (EEXIST)");
      expect(await refusal(join(file, 'x'), provenance)).toBe(
        "out: can't be used as output folder (ENOTDIR)",
      );
    }));

  test('refuses a manifest that is a folder', () =>
    withFolder(async (folder) => {
      await mkdir(join(folder, manifestName));
      expect(await refusal(folder, provenance)).toBe("out: can't be used as output folder (EISDIR)");
      await rm(join(folder, manifestName), { recursive: true });
    }));
});

function changedSetting() {
  const [method] = plan.methods;
  return { ...plan, methods: [{ ...method!, settings: { ...method!.settings, script: 'bad' } }] };
}
