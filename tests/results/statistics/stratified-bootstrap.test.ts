import { describe, expect, it } from 'vitest';
import { openStream, rootStream, type Stream } from '../../../harness/random.js';
import { interquartileMean } from '../../../results/statistics/interquartile-mean.js';
import {
  type StratifiedOptions,
  stratifiedBootstrap,
  stratifiedBootstrapDifference,
} from '../../../results/statistics/stratified-bootstrap.js';

const unequal = [
  [0.1, 0.5, 0.3],
  [0.9, 0.7, 0.8, 1.2, 0.4],
  [0.2, 0.25],
];

function options(changes: Partial<StratifiedOptions> = {}): StratifiedOptions {
  return { aggregate: 'mean-of-task-means', resamples: 2000, stream: rootStream(1), ...changes };
}

function normalTasks(stream: Stream, tasks: number, runs: number): number[][] {
  return Array.from({ length: tasks }, (_, t) =>
    Array.from({ length: runs }, () => 10 * t + stream.normal()),
  );
}

describe('stratifiedBootstrap', () => {
  it('stratifiedBootstrap({ mean-of-task-means }) weighs tasks equally, however many runs they have', () => {
    const { estimate, tasks, runs } = stratifiedBootstrap(unequal, options());
    expect(estimate).toBeCloseTo((0.3 + 0.8 + 0.225) / 3, 12);
    expect({ tasks, runs }).toEqual({ tasks: 3, runs: 10 });
  });

  it('stratifiedBootstrap({ interquartile-mean }) is the interquartile mean of all runs', () => {
    const { estimate } = stratifiedBootstrap(unequal, options({ aggregate: 'interquartile-mean' }));
    expect(estimate).toBeCloseTo(interquartileMean(unequal.flat()), 12);
  });

  it('stratifiedBootstrap(tasks) resamples seeds and never tasks', () => {
    // Without scatter within tasks nothing is left to resample, however far the tasks lie apart.
    for (const aggregate of ['mean-of-task-means', 'interquartile-mean'] as const) {
      const { low, high, estimate } = stratifiedBootstrap([[0, 0], [5, 5, 5], [9]], options({ aggregate }));
      expect(low).toBeCloseTo(estimate, 12);
      expect(high).toBeCloseTo(estimate, 12);
    }
  });

  it('stratifiedBootstrap({ mean-of-task-means }) has the width that the variances within tasks give', () => {
    // Variance of the aggregate: Σ s²/n (divisor n in s²) over tasks², and the mean of many runs is nearly normal.
    const tasks = normalTasks(rootStream(2), 4, 50);
    const variance = tasks.reduce((sum, runs) => {
      const mean = runs.reduce((a, b) => a + b, 0) / runs.length;
      return sum + runs.reduce((a, b) => a + (b - mean) ** 2, 0) / runs.length ** 2;
    }, 0);
    const expected = (2 * 1.959964 * Math.sqrt(variance)) / tasks.length;
    const { low, high } = stratifiedBootstrap(tasks, options({ resamples: 10_000 }));
    expect(Math.abs((high - low) / expected - 1)).toBeLessThan(0.06);
  });

  it('stratifiedBootstrap({ interquartile-mean }) takes the same replicates as writing each resample out', () => {
    const resamples = 200;
    const fast = stratifiedBootstrap(
      unequal,
      options({ aggregate: 'interquartile-mean', resamples, level: 0.5 }),
    );
    const stream = openStream(rootStream(1).path);
    const replicates = Array.from({ length: resamples }, () =>
      interquartileMean(
        unequal.flatMap((runs) => runs.map(() => runs[Math.floor(stream.uniform() * runs.length)]!)),
      ),
    ).sort((a, b) => a - b);
    expect(fast.low).toBeGreaterThanOrEqual(replicates[49]! - 1e-12);
    expect(fast.low).toBeLessThanOrEqual(replicates[50]! + 1e-12);
    expect(fast.high).toBeGreaterThanOrEqual(replicates[149]! - 1e-12);
    expect(fast.high).toBeLessThanOrEqual(replicates[150]! + 1e-12);
  });

  it('stratifiedBootstrap(tasks) narrows with the level and repeats with the stream', () => {
    const wide = stratifiedBootstrap(unequal, options({ level: 0.99 }));
    const narrow = stratifiedBootstrap(unequal, options({ level: 0.8 }));
    expect(narrow.high - narrow.low).toBeLessThan(wide.high - wide.low);
    expect(stratifiedBootstrap(unequal, options({ level: 0.8 }))).toEqual(narrow);
  });

  it('stratifiedBootstrap(tasks) refuses NaN with its task and position, and empty tasks', () => {
    expect(() => stratifiedBootstrap([[1], [2, Number.NaN]], options())).toThrow(
      'runs of task 1: position 1 is NaN, not a finite number',
    );
    expect(() => stratifiedBootstrap([[1], []], options())).toThrow(
      'runs of task 1: at least 1 needed, got 0',
    );
    expect(() => stratifiedBootstrap([], options())).toThrow(RangeError);
  });
});

describe('stratifiedBootstrapDifference', () => {
  const reference = normalTasks(rootStream(3), 3, 12);
  const candidate = reference.map((runs) => runs.map((value) => value + 0.25));

  it('stratifiedBootstrapDifference({ paired: true }) lets what both methods share cancel', () => {
    const paired = stratifiedBootstrapDifference(candidate, reference, { ...options(), paired: true });
    expect(paired.estimate).toBeCloseTo(0.25, 12);
    expect(paired.low).toBeCloseTo(0.25, 12);
    expect(paired.high).toBeCloseTo(0.25, 12);
  });

  it('stratifiedBootstrapDifference({ paired: false }) redraws both methods on their own', () => {
    const alone = stratifiedBootstrap(reference, options());
    const unpaired = stratifiedBootstrapDifference(candidate, reference, { ...options(), paired: false });
    const ratio = (unpaired.high - unpaired.low) / (alone.high - alone.low);
    expect(Math.abs(ratio / Math.SQRT2 - 1)).toBeLessThan(0.1);
  });

  it('stratifiedBootstrapDifference({ paired: false }) takes unequal numbers of runs, { paired: true } does not', () => {
    const fewer = reference.map((runs, t) => runs.slice(t));
    const run = (paired: boolean) =>
      stratifiedBootstrapDifference(candidate, fewer, { ...options(), paired });
    expect(run(false).runs).toBe(33);
    expect(() => run(true)).toThrow('paired runs need the same number of runs in every task');
    expect(() => stratifiedBootstrapDifference(candidate, [[1]], { ...options(), paired: false })).toThrow(
      'cannot compare 3 tasks with 1',
    );
  });
});
