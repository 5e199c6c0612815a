import { describe, expect, test } from 'vitest';
import { cellsOf } from '../../harness/cells.js';
import { type Crew, type CrewResult, openCrew } from '../../harness/crew.js';
import { rowKey, rowView, takeRows } from '../../harness/designs.js';
import type { MethodJob } from '../../harness/job.js';
import type { Plan } from '../../harness/plan/plan.js';
import { type FinishedCell, type RehearsalOptions, runRehearsal } from '../../harness/rehearsal.js';
import { type CellRow, cellId } from '../../harness/row.js';
import { setStage } from '../../harness/stage.js';
import { toyCatalogue } from './toy-catalogue.js';
import { smallPlan, toyPlan } from './toy-plan.js';

const workerFile = new URL('./scripted-worker.mjs', import.meta.url);

/** Proposes the first rows of the offer. */
const firstRows = ({ offer }: MethodJob): CrewResult => ({
  kind: 'proposed',
  proposal: {
    designs: takeRows(
      offer.designs,
      Array.from({ length: offer.batchSize }, (_, i) => i),
    ),
  },
  seconds: 1.5,
});

/** A crew on this thread that answers as told, and writes down what it was asked. */
function tableCrew(workers: number, answer: (job: MethodJob) => CrewResult | Promise<CrewResult>) {
  const jobs: MethodJob[] = [];
  const most = { now: 0, ever: 0 };
  const crew: Crew = {
    workers,
    async run(job) {
      jobs.push(job);
      most.now += 1;
      most.ever = Math.max(most.ever, most.now);
      await new Promise((resolve) => setImmediate(resolve));
      most.now -= 1;
      return answer(job);
    },
    close: () => Promise.resolve(),
  };
  return { crew, jobs, most };
}

async function rehearse(plan: Plan, crew: Crew, options: Partial<RehearsalOptions> = {}) {
  const finished: FinishedCell[] = [];
  await runRehearsal({
    plan,
    catalogue: toyCatalogue,
    crew,
    finished: new Set(),
    signal: new AbortController().signal,
    onFinished: async (cell) => {
      finished.push(cell);
    },
    ...options,
  });
  return finished;
}

const sortedRows = (cells: readonly FinishedCell[]): CellRow[] =>
  cells.map(({ verdict }) => verdict.row).sort((a, b) => (cellId(a) < cellId(b) ? -1 : 1));

describe('runRehearsal', () => {
  test('runs every cell of the plan once, with the seconds that the method took', async () => {
    const finished = await rehearse(smallPlan, tableCrew(2, firstRows).crew);
    const ids = finished.map(({ cell }) => cellId(cell.key)).sort();
    expect(ids).toEqual([...cellsOf(smallPlan)].map(({ key }) => cellId(key)).sort());
    expect(new Set(finished.map(({ seconds }) => seconds))).toEqual(new Set([1.5]));
    expect(finished.every(({ verdict }) => verdict.row.status === 'done')).toBe(true);
  });

  test('gives the same rows with one, two or five workers', async () => {
    const [one, two, five] = await Promise.all(
      [1, 2, 5].map(async (workers) =>
        sortedRows(await rehearse(smallPlan, tableCrew(workers, firstRows).crew)),
      ),
    );
    expect(two).toEqual(one);
    expect(five).toEqual(one);
  });

  test('has never more jobs under way than there are workers, and as many where there is work', async () => {
    const { crew, most } = tableCrew(3, firstRows);
    await rehearse(smallPlan, crew);
    expect(most.ever).toBe(3);
  });

  test('leaves out what is finished', async () => {
    const all = [...cellsOf(smallPlan)].map(({ key }) => cellId(key));
    const done = new Set(all.filter((_, i) => i % 3 > 0));
    const finished = await rehearse(smallPlan, tableCrew(2, firstRows).crew, { finished: done });
    expect(finished.map(({ cell }) => cellId(cell.key)).sort()).toEqual(
      all.filter((id) => !done.has(id)).sort(),
    );
  });

  test('reports one cell at a time', async () => {
    let open = 0;
    await rehearse(smallPlan, tableCrew(4, firstRows).crew, {
      onFinished: async () => {
        open += 1;
        expect(open).toBe(1);
        await new Promise((resolve) => setTimeout(resolve, 1));
        open -= 1;
      },
    });
    expect(open).toBe(0);
  });
});

describe('an offer', () => {
  test('holds the space, the visible designs, their scores, the batch size, the budget and a stream', async () => {
    const { crew, jobs } = tableCrew(1, firstRows);
    await rehearse(smallPlan, crew);
    for (const job of jobs) {
      expect(Object.keys(job).sort()).toEqual(['backend', 'method', 'offer', 'settings']);
      expect(Object.keys(job.offer).sort()).toEqual([
        'batchSize',
        'budgetSeconds',
        'designs',
        'scores',
        'space',
        'streamPath',
      ]);
      expect(job.offer).toMatchObject({ batchSize: 4, budgetSeconds: 5 });
      expect(job.offer.scores).toHaveLength(job.offer.designs.rows);
    }
  });

  test('names no task and no curtain', async () => {
    const { crew, jobs } = tableCrew(1, firstRows);
    await rehearse(smallPlan, crew);
    for (const job of jobs) expect(JSON.stringify(job)).not.toMatch(/slope|blend|ceiling|thin|noise/);
  });

  test('holds no hidden row: nothing that scores above the ceiling', async () => {
    const open = toyPlan('pool: 40', 'batch: 4', 'tasks: [slope]', 'seeds: 4', 'methods: [scripted]');
    const shut = { ...open, tasks: open.tasks.map((task) => ({ ...task, curtains: [{ ceiling: 0.5 }] })) };
    const [all, seen] = [tableCrew(1, firstRows), tableCrew(1, firstRows)];
    await rehearse(open, all.crew);
    await rehearse(shut, seen.crew);
    for (const [k, { offer }] of seen.jobs.entries()) {
      const pool = all.jobs[k]!.offer;
      expect([pool.designs.rows, offer.designs.rows]).toEqual([40, 20]);
      const visible = new Set(Array.from({ length: 20 }, (_, i) => rowKey(offer.designs, i)));
      const hidden = Array.from(pool.scores).filter((_, i) => !visible.has(rowKey(pool.designs, i)));
      expect(hidden).toHaveLength(20);
      expect(Math.min(...hidden)).toBeGreaterThan(Math.max(...offer.scores));
    }
  });
});

describe('a rehearsal ends early', () => {
  test('when it is interrupted: cells under way are dropped, finished ones are kept', async () => {
    const controller = new AbortController();
    const { crew, jobs } = tableCrew(2, (job) => {
      if (jobs.length >= 5) controller.abort();
      return firstRows(job);
    });
    const finished = await rehearse(smallPlan, crew, { signal: controller.signal });
    expect(jobs.length).toBeLessThanOrEqual(6);
    expect(finished.length).toBeLessThan(jobs.length);
    expect(finished.every(({ verdict }) => verdict.row.status === 'done')).toBe(true);
  });

  test('with the error of whoever records it, after which nothing more is recorded', async () => {
    const recorded: string[] = [];
    const { crew, jobs } = tableCrew(3, firstRows);
    const run = rehearse(smallPlan, crew, {
      onFinished: async ({ cell }) => {
        recorded.push(cellId(cell.key));
        if (recorded.length === 4) throw new Error('the disk is full');
      },
    });
    await expect(run).rejects.toThrow('the disk is full');
    expect(recorded).toHaveLength(4);
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(recorded).toHaveLength(4);
    expect(jobs.length).toBeLessThanOrEqual(7);
  });

  test('with the error of a task that cannot be made, and does not record jobs that end with it as failed', async () => {
    const broken = {
      tasks: [
        {
          ...toyCatalogue.tasks[0]!,
          make: () => {
            throw new Error('no such world');
          },
        },
        toyCatalogue.tasks[1]!,
      ],
    };
    const plan = toyPlan('seeds: 1', 'pool: 20', 'batch: 2', 'tasks: [blend, slope]', 'methods: [scripted]');
    const recorded: FinishedCell[] = [];
    const crew = tableCrew(2, () => ({ kind: 'lost', reason: 'interrupted', seconds: 0 })).crew;
    const run = rehearse(plan, crew, {
      catalogue: broken,
      onFinished: async (cell) => {
        recorded.push(cell);
      },
    });
    await expect(run).rejects.toThrow('no such world');
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(recorded).toEqual([]);
  });
});

describe('a rehearsal with a crew of threads', () => {
  const scripts = {
    throws: 'the colony collapsed',
    rejects: 'no nectar',
    hangs: 'took longer than its budget of 1 s',
    waits: 'took longer than its budget of 1 s',
    exits: 'its worker ended: it exited without an answer',
    nothing: 'returned no proposal',
    nan: 'design 1, column "x2": NaN is not a finite number',
    outside: 'design 1, column "x2": 1000000000 lies outside -1 to 1',
    few: 'returned 1 designs, 3 were asked for',
  };
  const planOf = (methods: readonly string[]) =>
    toyPlan(
      'seeds: 2',
      'pool: 20',
      'batch: 3',
      'budgetSeconds: 1',
      'tasks: [slope]',
      'methods:',
      ...methods.map((script) => `  - { method: scripted, as: ${script}, settings: { script: ${script} } }`),
    );

  test('records each method that breaks down with its reason, and the others as if it were not there', async () => {
    const names = Object.keys(scripts);
    const plan = planOf(['vandal', ...names.slice(0, 5), 'good', ...names.slice(5)]);
    const crew = openCrew(workerFile, 2);
    const finished = await rehearse(plan, crew);
    await crew.close();
    const rows = sortedRows(finished);
    expect(rows).toHaveLength(2 * (names.length + 2));
    for (const row of rows.filter(({ method }) => method !== 'good' && method !== 'vandal')) {
      const { bestVisible } = row;
      expect(row).toMatchObject({
        status: 'failed',
        reason: scripts[row.method as keyof typeof scripts],
        best: 0,
        median: 0,
        lift: -bestVisible,
        optimism: undefined,
        distinct: 0,
      });
    }
    const good = rows.filter(({ method }) => method === 'good');
    const { crew: calm } = tableCrew(1, ({ offer }) => {
      const designs = takeRows(offer.designs, [0, 1, 2]);
      return { kind: 'proposed', proposal: { designs, believed: offer.scores.slice(0, 3) }, seconds: 0 };
    });
    expect(good).toEqual(sortedRows(await rehearse(planOf(['good']), calm)));
    expect(good.map(({ status }) => status)).toEqual(['done', 'done']);
  });

  test('lets no method change what the next one sees', async () => {
    const crew = openCrew(workerFile, 1);
    const finished = await rehearse(planOf(['vandal', 'good']), crew);
    await crew.close();
    for (const { cell, stage, verdict } of finished.filter(({ cell: { key } }) => key.method === 'good')) {
      const fresh = setStage(planOf(['good']), cell, toyCatalogue);
      expect([stage.designs, stage.scores, stage.space]).toEqual([fresh.designs, fresh.scores, fresh.space]);
      expect(rowView(verdict.batch!.proposal.designs, 0)).toEqual(rowView(fresh.designs, 0));
    }
  });
});
