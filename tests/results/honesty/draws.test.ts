import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import {
  centredDifferencesOf,
  differencesOf,
  drawCopies,
  drawPositions,
  moveTo,
  pick,
  scatteredMethods,
  skewnessOf,
} from '../../honesty/draws.js';
import { bootstrapTInterval } from '../../honesty/others/bootstrap-t.js';
import { johnsonInterval } from '../../honesty/others/johnson.js';
import type { TaskScores } from '../../honesty/score-table.js';

const numbers = (...values: number[]) => Float64Array.from(values);

const task: TaskScores = {
  task: 'made',
  seeds: 2,
  methods: new Map([
    ['repeat-best', [numbers(0.1, 0.5), numbers(0.1, 0.5)]],
    ['moving', [numbers(0.2, 0.6), numbers(0.3, 0.9)]],
    ['steady', [numbers(0.2, 0.6), numbers(0.2, 0.6)]],
  ]),
};

describe('differencesOf', () => {
  it('differencesOf(task, method) pairs by stream and seed', () => {
    const differences = differencesOf(task, 'moving');
    [0.1, 0.1, 0.2, 0.4].forEach((expected, i) => {
      expect(differences[i]).toBeCloseTo(expected, 12);
    });
  });

  it('centredDifferencesOf(task, method) and moveTo(values, mean) move them to a known mean', () => {
    const mean = (values: ArrayLike<number>) =>
      Array.from(values).reduce((sum, value) => sum + value, 0) / values.length;
    expect(mean(centredDifferencesOf(task, 'moving'))).toBeCloseTo(0, 12);
    const moved = moveTo(numbers(1, 2, 6), 0.05);
    expect(mean(moved)).toBeCloseTo(0.05, 12);
    expect(moved[2]! - moved[0]!).toBeCloseTo(5, 12);
  });

  it('scatteredMethods(task) leaves out the reference, and methods that differ alike everywhere', () => {
    expect(
      scatteredMethods({
        ...task,
        methods: new Map([...task.methods, ['steady', [numbers(1.1, 1.5), numbers(1.1, 1.5)]]]),
      }),
    ).toEqual(['moving']);
  });
});

describe('drawPositions', () => {
  it('drawPositions(n, limit, stream) draws each position alike, with replacement', () => {
    const counts = [0, 0, 0, 0];
    for (const position of drawPositions(4000, 4, rootStream(1))) counts[position]!++;
    // Five standard deviations of a count of 1,000: 5 · √750.
    for (const count of counts) expect(Math.abs(count - 1000)).toBeLessThan(137);
    expect(pick([7, 8, 9], [2, 0, 2])).toEqual([9, 7, 9]);
  });
});

describe('drawCopies', () => {
  it('drawCopies(task, method) gives a difference one sign as often as the other', () => {
    const [differences] = drawCopies(task, 'moving', { copies: 1, n: 4000, stream: rootStream(2) });
    const sizes = new Set(differences!.map((value) => Math.abs(value).toFixed(9)));
    expect([...sizes].sort()).toEqual(['0.100000000', '0.300000000']);
    const positive = differences!.filter((value) => value > 0).length;
    expect(Math.abs(positive - 2000)).toBeLessThan(5 * Math.sqrt(1000));
  });

  it('drawCopies(task, method) refuses more copies than there are other streams', () => {
    const draw = () => drawCopies(task, 'moving', { copies: 2, n: 1, stream: rootStream(1) });
    expect(draw).toThrow('moving has scores of 2 streams only');
  });
});

describe('skewnessOf', () => {
  it('skewnessOf([0, 0, 0, 1]) is 0.09375 / 0.1875^1.5 = 1.1547 by hand, and −1.1547 mirrored', () => {
    expect(skewnessOf([0, 0, 0, 1])).toBeCloseTo(1.1547, 4);
    expect(skewnessOf([0, 0, 0, -1])).toBeCloseTo(-1.1547, 4);
  });
});

describe('johnsonInterval', () => {
  it("johnsonInterval([0, 0, 0, 1]) is Student's moved by μ₃ / (6 s² n) = 0.25 / (6 · 0.25 · 4), by hand", () => {
    // μ₃ with n/((n − 1)(n − 2)): 4 · 0.375 / 6 = 0.25; s² = 0.25; t₀.₉₇₅(3) = 3.182 of the printed tables.
    const { low, high } = johnsonInterval([0, 0, 0, 1]);
    expect((low + high) / 2).toBeCloseTo(0.25 + 0.25 / 6, 9);
    expect((high - low) / 2).toBeCloseTo(3.182 * 0.25, 3);
  });
});

describe('bootstrapTInterval', () => {
  it('bootstrapTInterval(values) reaches further on the side of the long tail, unlike Student', () => {
    const values = [0.1, 0.2, 0.2, 0.3, 0.3, 0.4, 0.5, 0.7, 1.2, 2.9];
    const mean = 0.68;
    const { low, high } = bootstrapTInterval(values, { resamples: 2000, stream: rootStream(3) });
    expect(high - mean).toBeGreaterThan(1.5 * (mean - low));
  });
});
