import { describe, expect, test } from 'vitest';
import { settingsHash } from '../../../harness/cells.js';
import type { Plan } from '../../../harness/plan/plan.js';
import { mergeSweepPlans, reportedLabels, sweepPlanOf } from '../../../results/sweep/sweep-plan.js';
import { toyPlan } from '../../harness/toy-plan.js';

const swept = (steps: number, ...more: string[]): Plan =>
  toyPlan(
    'tasks: [slope, blend]',
    'methods:',
    `  - { method: scripted, as: firm, settings: { search: { steps: ${steps} } }, sweep: { script: [a, b] } }`,
    '  - idle-best',
    '  - { method: scripted, as: soft, sweep: { script: [c, d] } }',
    ...more,
  );

describe('sweepPlanOf(plan)', () => {
  test('gives each sweep with its variants and their settings, in order', () => {
    const plan = swept(5);
    const [a, b, , c, d] = plan.methods.map(settingsHash);
    expect(sweepPlanOf(plan)).toEqual({
      on: 'seeds',
      tasks: ['slope', 'blend'],
      sweeps: [
        {
          method: 'firm',
          variants: [
            { label: 'firm(script=a)', settings: a },
            { label: 'firm(script=b)', settings: b },
          ],
        },
        {
          method: 'soft',
          variants: [
            { label: 'soft(script=c)', settings: c },
            { label: 'soft(script=d)', settings: d },
          ],
        },
      ],
    });
    expect(sweepPlanOf(swept(5, 'choose: { on: tasks }'))!.on).toBe('tasks');
  });

  test('gives nothing for a plan without a sweep, as manifests from before there were any hold', () => {
    expect(sweepPlanOf(toyPlan('tasks: [slope]', 'methods: [scripted]'))).toBeUndefined();
  });
});

test('reportedLabels(plan) names a sweep once, in the place of its variants', () => {
  expect(reportedLabels(swept(5))).toEqual(['firm', 'idle-best', 'soft']);
});

describe('mergeSweepPlans(plans)', () => {
  const plan = sweepPlanOf(swept(5))!;
  const [firm, soft] = plan.sweeps;

  test('is nothing where no ledger has a sweep, and the one plan where one has', () => {
    expect(mergeSweepPlans([undefined, undefined])).toBeUndefined();
    expect(mergeSweepPlans([undefined, plan, undefined, plan])).toEqual(plan);
  });

  test('puts different sweeps together', () => {
    expect(
      mergeSweepPlans([
        { ...plan, sweeps: [soft!] },
        { ...plan, sweeps: [firm!] },
      ]),
    ).toEqual({
      ...plan,
      sweeps: [soft, firm],
    });
  });

  test('refuses a sweep of other settings, though its variants be labelled the same', () => {
    expect(() => mergeSweepPlans([plan, sweepPlanOf(swept(6))])).toThrow(
      "the ledgers can't be compared together, as the plans sweep other settings of firm; compare each alone",
    );
  });

  test('refuses other halves', () => {
    const other = 'the plans choose the settings of their sweeps on other halves';
    expect(() => mergeSweepPlans([plan, { ...plan, on: 'tasks' }])).toThrow(other);
    const [a, b] = [
      { ...plan, on: 'tasks' as const },
      { ...plan, on: 'tasks' as const, tasks: ['blend', 'slope'] },
    ];
    expect(() => mergeSweepPlans([a, b])).toThrow(other);
    expect(mergeSweepPlans([plan, { ...plan, tasks: ['blend'] }])).toEqual(plan);
  });
});
