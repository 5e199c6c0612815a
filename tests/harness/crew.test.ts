import { afterAll, describe, expect, test } from 'vitest';
import { firstLine, openCrew } from '../../harness/crew.js';
import { matrixFromRows } from '../../harness/designs.js';
import type { MethodJob } from '../../harness/job.js';
import { mixedSpace } from './toy-stage.js';

const workerFile = new URL('./scripted-worker.mjs', import.meta.url);

function job(script: string, budgetSeconds = 30): MethodJob {
  return {
    method: 'scripted',
    settings: { script },
    backend: 'kernel',
    offer: {
      space: mixedSpace,
      designs: matrixFromRows([
        [2, 1, 0],
        [3, 2, 1],
        [5, 5, 2],
      ]),
      scores: Float64Array.of(1, 2, 3),
      batchSize: 2,
      budgetSeconds,
      streamPath: '["a"]',
    },
  };
}

describe('a crew', () => {
  const crew = openCrew(workerFile, 2);
  afterAll(() => crew.close());

  const good = {
    kind: 'proposed',
    seconds: 0.25,
    proposal: {
      designs: matrixFromRows([
        [2, 1, 0],
        [3, 2, 1],
      ]),
      believed: Float64Array.of(1, 2),
    },
  };

  test('hands back what a method proposed', async () => {
    expect(await crew.run(job('good'))).toEqual(good);
  });

  test.each([
    ['throws', { kind: 'threw', reason: 'the colony collapsed', seconds: 0.5 }],
    ['throws-a-word', { kind: 'threw', reason: 'no bees', seconds: 0.5 }],
    ['rejects', { kind: 'threw', reason: 'no nectar', seconds: 0.5 }],
    ['throws-unseen', { kind: 'lost', reason: 'its worker ended: nobody listens', seconds: 0 }],
    ['rejects-unseen', { kind: 'lost', reason: 'its worker ended: nobody waits', seconds: 0 }],
    ['exits', { kind: 'lost', reason: 'its worker ended: it exited without an answer', seconds: 0 }],
    [
      'exits-as-failed',
      { kind: 'lost', reason: 'its worker ended: it exited without an answer', seconds: 0 },
    ],
    ['function', { kind: 'threw', reason: "() => 'because' could not be cloned.", seconds: 0.5 }],
  ])('tells how a method that %s ended, and works on', async (script, result) => {
    expect(await crew.run(job(script))).toEqual(result);
    expect(await crew.run(job('good'))).toEqual(good);
  });

  test.each(['hangs', 'waits'])('ends a method that %s past its budget', async (script) => {
    expect(await crew.run(job(script, 0.3))).toEqual({
      kind: 'lost',
      reason: 'took longer than its budget of 0.3 s',
      seconds: 0.3,
    });
    expect(await crew.run(job('good'))).toEqual(good);
  });

  test('ends it without harm to what another worker does', async () => {
    const hanging = crew.run(job('hangs', 0.5));
    const others = [];
    for (let i = 0; i < 20; i++) others.push(await crew.run(job('good')));
    expect(others).toEqual(others.map(() => good));
    expect(await hanging).toMatchObject({ kind: 'lost' });
  });

  test('does not let a method change the offer of another', async () => {
    const given = job('vandal');
    const before = structuredClone(given);
    await crew.run(given);
    expect(given).toEqual(before);
  });
});

test('closing a crew ends the jobs under way as interrupted', async () => {
  const crew = openCrew(workerFile, 2);
  const jobs = [crew.run(job('hangs')), crew.run(job('waits'))];
  await crew.close();
  const interrupted = { kind: 'lost', reason: 'interrupted', seconds: 0 };
  expect(await Promise.all(jobs)).toEqual([interrupted, interrupted]);
});

test('a worker that cannot be loaded is told, not waited for', async () => {
  const crew = openCrew(new URL('./broken-worker.mjs', import.meta.url), 1);
  const reason = expect.stringContaining('this worker cannot be loaded');
  expect(await crew.run(job('good'))).toEqual({ kind: 'lost', reason, seconds: 0 });
  expect(await crew.run(job('good'))).toEqual({ kind: 'lost', reason, seconds: 0 });
  await crew.close();
});

describe('firstLine', () => {
  test.each<[unknown, string]>([
    [new Error('a\n  b\tc '), 'a b c'],
    ['a word', 'a word'],
    [undefined, 'undefined'],
    [new Error(''), 'no reason given'],
    [{ toString: () => '  ' }, 'no reason given'],
  ])('%o as "%s"', (error, line) => {
    expect(firstLine(error)).toBe(line);
  });

  test('cuts a long message to 300 characters', () => {
    const line = firstLine(new Error('x'.repeat(1000)));
    expect(line).toHaveLength(300);
    expect(line.endsWith('…')).toBe(true);
  });
});
