import { describe, expect, test } from 'vitest';
import { renderGuard } from '../../../results/guard/terminal.js';
import { guardLedgers } from '../../../results/guard.js';
import { makePlan, makeRows, makeSide } from './guarded.js';

const plan = makePlan(['hill', 'dale'], ['steady', 'a-method-with-a-label-of-forty-letters-x'], {
  seeds: 16,
});
const before = makeSide(
  'runs/before',
  plan,
  makeRows(plan, (_, __, seed) => 0.5 + seed / 100),
);
const after = makeSide(
  'runs/after',
  plan,
  makeRows(plan, (method, _, seed) => 0.5 + seed / 100 - (method === 'steady' ? 0 : 0.05 + (seed % 2) / 100)),
);
const options = { margin: 0.02, score: 'best', strict: false } as const;

describe('renderGuard(report)', () => {
  const text = renderGuard(guardLedgers(before, after, options));

  test('has a line for each method on each task, and tells regressions in sentences with size and interval', () => {
    expect(text).toMatch(/^a-method-with-a-lab\S* +dale +-0\.055 .*regression/m);
    expect(text.replace(/\s+/g, ' ')).toContain(
      '✗ a-method-with-a-label-of-forty-letters-x on hill (open) lost 0.055, 90 % interval [0.053, 0.057]',
    );
    expect(text).toContain('Failed: 3 regressions found at a margin of 0.02 in 6 tests.');
  });

  test('tells a method whose scores are all the same in one line', () => {
    expect(text.match(/^steady .*$/gm)).toHaveLength(1);
    expect(text).toMatch(/^steady +everywhere +0\.000 .*unchanged$/m);
  });

  test('states the pairs of a task in its foot', () => {
    expect(text.replace(/\s+/g, ' ')).toContain('task, curtain and seed, 16 pairs a task,');
  });

  test('keeps to 100 columns', () => {
    for (const line of text.split('\n')) expect(line.length).toBeLessThanOrEqual(100);
  });

  test('says passed where nothing was lost', () => {
    expect(renderGuard(guardLedgers(before, before, options))).toContain(
      'Passed: no regression shown at a margin of 0.02 in 6 tests.',
    );
  });

  test('with too few seeds passes, and says how many it would take; when strict it fails', () => {
    const few = makePlan(['hill'], ['a'], { seeds: 4 });
    const [old, now] = [0, 1].map((k) =>
      makeSide(
        `${k}`,
        few,
        makeRows(few, (_, __, seed) => 0.5 + (k * (seed % 2 ? 1 : -1)) / 50),
      ),
    );
    const shown = guardLedgers(old!, now!, options);
    expect(renderGuard(shown)).toMatch(/too few seeds +0 % +\d+$/m);
    expect(renderGuard(shown)).toContain('Passed');
    expect(renderGuard(guardLedgers(old!, now!, { ...options, strict: true }))).toContain('Failed');
  });
});
