import { mkdir, writeFile } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { type RehearseArguments, readRehearsal } from '../../cli/rehearse-options.js';
import { OnebatchError } from '../../harness/errors.js';
import { toyCatalogue } from '../harness/toy-catalogue.js';
import { withFolder } from '../results/temporary-folder.js';

const text = 'name: hay\nseeds: 4\ntasks: [slope]\nmethods: [scripted]\n';

/** Reads a rehearsal from a folder with a plan in it. */
const read = (given: RehearseArguments) =>
  withFolder(async (folder) => {
    await writeFile(join(folder, 'hay.plan.yaml'), text);
    await mkdir(join(folder, 'loft'));
    const plan = given.plan === undefined ? join(folder, 'hay.plan.yaml') : join(folder, given.plan);
    try {
      return await readRehearsal({ ...given, plan }, toyCatalogue);
    } catch (error) {
      expect(error).toBeInstanceOf(OnebatchError);
      throw (error as Error).message.replace(`${folder}/`, '');
    }
  });

describe('readRehearsal', () => {
  test("takes the plan's seeds, a folder named as the plan and as many workers as cores", async () => {
    const { plan, out, workers } = await read({});
    expect(plan).toMatchObject({ name: 'hay', seeds: 4 });
    expect(out).toBe(join('out', 'hay'));
    expect(workers).toBe(availableParallelism());
  });

  test('puts what was typed over it', async () => {
    const { plan, out, workers } = await read({ seeds: '7', out: 'barn', workers: '3' });
    expect([plan.seeds, out, workers]).toEqual([7, 'barn', 3]);
  });

  test.each<[RehearseArguments, string]>([
    [{ seeds: '-1' }, '--seeds: is "-1", must be a whole number from 1 to 100000'],
    [{ seeds: '0' }, '--seeds: is "0", must be a whole number from 1 to 100000'],
    [{ seeds: '1.5' }, '--seeds: is "1.5", must be a whole number from 1 to 100000'],
    [{ seeds: '1e3' }, '--seeds: is "1e3", must be a whole number from 1 to 100000'],
    [{ seeds: '100001' }, '--seeds: is "100001", must be a whole number from 1 to 100000'],
    [{ seeds: 'many' }, '--seeds: is "many", must be a whole number from 1 to 100000'],
    [{ seeds: '' }, '--seeds: is "", must be a whole number from 1 to 100000'],
    [{ workers: '0' }, '--workers: is "0", must be a whole number from 1 to 256'],
    [{ workers: '9999' }, '--workers: is "9999", must be a whole number from 1 to 256'],
    [{ out: '' }, '--out: is empty; name a folder'],
    [
      { plan: 'straw.plan.yaml' },
      'straw.plan.yaml: there is no such plan file; check the path, or leave it out to run the demo',
    ],
    [{ plan: 'loft' }, 'loft: is a folder; name a plan file'],
    [{ plan: 'hay.plan.yaml/x' }, "hay.plan.yaml/x: can't be read (ENOTDIR)"],
  ])('refuses %j', async (given, message) => {
    await expect(read(given)).rejects.toBe(message);
  });
});
