import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { type RehearseArguments, readRehearsal } from '../../cli/rehearse-options.js';
import { toyCatalogue } from '../harness/toy-catalogue.js';
import { withFolder } from '../results/temporary-folder.js';

const plain = 'tasks: [slope]\nmethods: [scripted]\n';
const swept = 'tasks: [slope]\nmethods: [{ method: scripted, sweep: { script: [a, b] } }]\n';

const read = (text: string, given: RehearseArguments) =>
  withFolder(async (folder) => {
    const plan = join(folder, 'p.yaml');
    await writeFile(plan, text);
    return readRehearsal({ ...given, plan }, toyCatalogue);
  });

describe('readRehearsal of a plan with a sweep', () => {
  test('chooses on halves unless --same-cells is given, which is no part of the plan', async () => {
    const [halves, same] = [await read(swept, {}), await read(swept, { sameCells: true })];
    expect([halves.sameCells, same.sameCells]).toEqual([false, true]);
    expect(same.plan).toEqual(halves.plan);
  });

  test('refuses a single seed, but for --same-cells', async () => {
    const message =
      'the sweep of scripted is chosen on half of the seeds and reported on the other half, which takes 2 seeds, not 1; raise --seeds, or say --same-cells';
    await expect(read(swept, { seeds: '1' })).rejects.toThrow(message);
    await expect(read(`seeds: 1\n${swept}`, {})).rejects.toThrow(message);
    expect((await read(`seeds: 1\n${swept}`, { seeds: '2' })).plan.seeds).toBe(2);
    expect((await read(swept, { seeds: '1', sameCells: true })).plan.seeds).toBe(1);
  });

  test('refuses --same-cells where nothing is swept', async () => {
    await expect(read(plain, { sameCells: true })).rejects.toThrow(
      '--same-cells: the plan sweeps no setting; leave it out',
    );
  });

  test('refuses --until-decided, and says what to do instead', async () => {
    await expect(read(swept, { untilDecided: true })).rejects.toThrow(
      '--until-decided: the plan sweeps settings, and what is compared would change between looks; rehearse the sweep with --seeds first, then the chosen settings until decided, with another seed in the plan',
    );
  });
});
