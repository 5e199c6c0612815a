import { beforeAll, describe, expect, test } from 'vitest';
import { cellsOf } from '../../harness/cells.js';
import { judge, type Verdict } from '../../harness/judge.js';
import type { Plan } from '../../harness/plan/plan.js';
import { methodStream, setStage } from '../../harness/stage.js';
import { conservative } from '../../methods/conservative.js';
import { ensembleAscent } from '../../methods/ensemble-ascent.js';
import { gradientAscent } from '../../methods/gradient-ascent.js';
import { styblinskiTang } from '../../tasks/styblinski-tang.js';

/**
 * Common practice, no published source: a network climbed by its gradient is fooled by its own mistakes, and a caution
 * makes it less so. Held on a real task behind a ceiling, over seeds: each claim is about a mean paired over seeds, and
 * asks for more than two standard errors. All methods train the same network and climb as many steps of the same size.
 */
const surrogate = { width: 32, layers: 2, steps: 250, batch: 32, learningRate: 0.003 };
const search = { steps: 100, stepSize: 0.005, traceEvery: 10 };
const mined = { steps: 5, stepSize: 0.08, rows: 16 };
const entries = [
  { label: 'naive', method: gradientAscent, settings: { surrogate, search } },
  {
    label: 'fixed weight',
    method: conservative,
    settings: { surrogate, search, caution: { ...mined, adjust: false, weight: 0.3 } },
  },
  {
    label: 'adjusted weight',
    method: conservative,
    settings: { surrogate, search, caution: { ...mined, adjust: true, target: 0.5 } },
  },
  {
    label: 'lower bound',
    method: ensembleAscent,
    settings: { surrogate: { ...surrogate, members: 3 }, search, caution: { spreads: 2 } },
  },
];

const plan: Plan = {
  name: 'fooled',
  seed: 7,
  seeds: 8,
  pool: 2000,
  batch: 16,
  budgetSeconds: 60,
  backend: 'kernel',
  keep: [],
  tasks: [
    {
      label: 'styblinski-tang',
      family: 'styblinski-tang',
      settings: styblinskiTang.settings.parse({ dimensions: 12 }),
      curtains: [{ ceiling: 0.5, thin: 200, noise: 0.3 }],
    },
  ],
  methods: entries.map(({ label, method, settings }) => ({
    label,
    method: method.name,
    settings: method.settings.parse(settings),
  })),
};

/** Verdicts by method, in the order of seeds. */
const verdicts = new Map<string, Verdict[]>(entries.map(({ label }) => [label, []]));

beforeAll(async () => {
  for (const cell of cellsOf(plan)) {
    const stage = setStage(plan, cell, { tasks: [styblinskiTang] });
    const { space, designs, scores } = stage;
    const { batch: batchSize, budgetSeconds } = plan;
    const { method } = entries.find(({ label }) => label === cell.method.label)!;
    const proposal = await method.propose(
      { space, designs, scores, batchSize, budgetSeconds, stream: methodStream(plan, cell) },
      cell.method.settings,
    );
    verdicts.get(cell.method.label)!.push(judge(cell, stage, proposal, batchSize));
  }
});

describe('common practice: naive gradient ascent under a ceiling curtain', () => {
  /** Mean over the batch at a recorded step, normalized, seed by seed. */
  const along = (step: number, what: 'believed' | 'truth'): number[] =>
    verdicts.get('naive')!.map(({ trace }) => mean(trace!.find((record) => record.step === step)![what]));

  test('believes in more at every tenth step, whatever the seed', () => {
    for (let step = 10; step <= 100; step += 10) {
      const before = along(step - 10, 'believed');
      along(step, 'believed').forEach((believed, seed) => {
        expect(believed, `step ${step}, seed ${seed + 1}`).toBeGreaterThan(before[seed]!);
      });
    }
  });

  test('has a true score that first rises, and ends below what it was at its tenth step', () => {
    const tenth = along(10, 'truth');
    expectAbove(differences(tenth, along(0, 'truth')));
    expectAbove(differences(tenth, along(100, 'truth')));
  });

  test('believes its batch to be far better than it is, by more than a tenth of the way from worst to optimum', () => {
    expectAbove(verdicts.get('naive')!.map(({ row }) => row.optimism! - 0.1));
  });
});

describe('common practice: caution', () => {
  const optimismOf = (of: string) => verdicts.get(of)!.map(({ row }) => row.optimism!);

  test.each(['fixed weight', 'adjusted weight', 'lower bound'])(
    'by %s lowers the optimism of the same network climbed by the same steps',
    (label) => {
      expectAbove(differences(optimismOf('naive'), optimismOf(label)));
    },
  );

  test.each(['fixed weight', 'adjusted weight'])(
    'by conservative training with %s finds a design better than the best visible one',
    (label) => {
      expectAbove(verdicts.get(label)!.map(({ row }) => row.lift));
    },
  );
});

/** Expects a mean more than two standard errors above 0. */
function expectAbove(values: readonly number[]): void {
  const centre = mean(values);
  const squares = values.reduce((sum, value) => sum + (value - centre) ** 2, 0);
  const standardError = Math.sqrt(squares / (values.length - 1) / values.length);
  expect(centre, `${centre} with standard error ${standardError}`).toBeGreaterThan(2 * standardError);
}

function differences(a: readonly number[], b: readonly number[]): number[] {
  return a.map((value, i) => value - b[i]!);
}

function mean(values: ArrayLike<number>): number {
  return Array.from(values).reduce((sum, value) => sum + value, 0) / values.length;
}
