import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { improvementProbability } from '../../../results/statistics/improvement-probability.js';
import { varghaDelaney } from '../../../results/statistics/vargha-delaney.js';

const options = (paired = false) => ({ paired, resamples: 2000, stream: rootStream(1) });

describe('improvementProbability', () => {
  it('improvementProbability(candidate, reference) is the mean of A over tasks, for unequal sizes too', () => {
    const sample = fc.array(fc.integer({ min: -4, max: 4 }), { minLength: 1, maxLength: 6 });
    fc.assert(
      fc.property(fc.array(fc.tuple(sample, sample), { minLength: 1, maxLength: 4 }), (tasks) => {
        const { estimate } = improvementProbability(
          tasks.map(([ours]) => ours),
          tasks.map(([, theirs]) => theirs),
          { paired: false, resamples: 2, stream: rootStream(1) },
        );
        const mean =
          tasks.reduce((sum, [ours, theirs]) => sum + varghaDelaney(ours, theirs).a, 0) / tasks.length;
        expect(estimate).toBeCloseTo(mean, 12);
      }),
    );
  });

  it('improvementProbability(candidate, reference) replicates what redrawing both samples gives', () => {
    // Variance of A from a redraw of single-point reference: binomial, p = 0.7 over 40 runs.
    const candidate = [Array.from({ length: 40 }, (_, i) => (i < 28 ? 1 : -1))];
    const { estimate, low, high } = improvementProbability(candidate, [[0, 0, 0]], options());
    expect(estimate).toBeCloseTo(0.7, 12);
    // Binomial quantiles at 2.5 and 97.5 % (SciPy 1.17.1): 22 and 33 of 40.
    expect(Math.round(low * 40)).toBe(22);
    expect(Math.round(high * 40)).toBe(33);
  });

  it('improvementProbability(a method, itself) is ½, and certain wins leave no width', () => {
    const runs = [
      [1, 2, 3, 4],
      [5, 5, 7],
    ];
    const itself = improvementProbability(runs, runs, options(true));
    expect([itself.estimate, itself.low, itself.high]).toEqual([0.5, 0.5, 0.5]);
    const better = runs.map((task) => task.map((score) => score + 10));
    const sure = improvementProbability(better, runs, options());
    expect([sure.estimate, sure.low, sure.high, sure.tasks]).toEqual([1, 1, 1, 2]);
  });

  it('improvementProbability({ paired: true }) is narrower where both methods share the luck of the seed', () => {
    const draws = rootStream(2);
    const reference = [Array.from({ length: 30 }, () => draws.normal())];
    const candidate = [reference[0]!.map((value) => value + 0.2)];
    const paired = improvementProbability(candidate, reference, options(true));
    const unpaired = improvementProbability(candidate, reference, options(false));
    expect(paired.estimate).toBe(unpaired.estimate);
    expect(paired.high - paired.low).toBeLessThan(0.5 * (unpaired.high - unpaired.low));
  });

  it('improvementProbability(candidate, reference) refuses NaN, different tasks, and unpaired runs as paired', () => {
    expect(() => improvementProbability([[Number.NaN]], [[1]], options())).toThrow(
      'runs of task 0: position 0 is NaN',
    );
    expect(() => improvementProbability([[1], [1]], [[1]], options())).toThrow(
      'cannot compare 2 tasks with 1',
    );
    expect(() => improvementProbability([[1, 2]], [[1]], options(true))).toThrow('paired runs need');
  });
});
