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

  test('until decided, allows eight rounds of the seeds, and looks after each', async () => {
    const { plan } = await read({ untilDecided: true });
    expect([plan.seeds, plan.looks]).toEqual([32, [4, 8, 12, 16, 20, 24, 28, 32]]);
    const { plan: other } = await read({ untilDecided: true, seeds: '6', mostSeeds: '15' });
    expect([other.seeds, other.looks]).toEqual([15, [6, 12, 15]]);
  });

  test('a plan whose seeds are all run names no looks', async () => {
    expect((await read({})).plan).not.toHaveProperty('looks');
  });

  test.each<[RehearseArguments, string]>([
    [{ mostSeeds: '9' }, '--most-seeds: needs --until-decided; without it, say --seeds'],
    [{ untilDecided: true, mostSeeds: '0' }, '--most-seeds: is "0", must be a whole number from 1 to 100000'],
    [
      { untilDecided: true, mostSeeds: '3' },
      '--most-seeds: is 3, fewer than the 4 seeds of a round; give --seeds a smaller number',
    ],
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
