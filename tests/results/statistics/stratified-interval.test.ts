import { describe, expect, it } from 'vitest';
import { rootStream } from '../../../harness/random.js';
import { stratifiedInterval } from '../../../results/statistics/stratified-interval.js';
import { studentInterval } from '../../../results/statistics/student-interval.js';

describe('stratifiedInterval', () => {
  it("stratifiedInterval([one task]) is Student's, whatever the number of values", () => {
    for (const n of [2, 8, 200]) {
      const stream = rootStream(n);
      const values = Array.from({ length: n }, () => stream.normal());
      const { low, high } = studentInterval(values);
      const found = stratifiedInterval([values])!;
      expect(found.method).toBe('student-t');
      expect(found.low).toBeCloseTo(low, 9);
      expect(found.high).toBeCloseTo(high, 9);
    }
  });

  it('stratifiedInterval(tasks) is mean ± t · √(Σ s²/n) / tasks with degrees of freedom by Satterthwaite', () => {
    // Two tasks of 1 … 5 and ten times that: s²/n 0.5 and 50, mean 16.5, standard error √50.5 / 2,
    // 50.5² / (0.5²/4 + 50²/4) = 4.0796 degrees of freedom; t₀.₉₇₅ there lies between the printed 2.776 and 2.571.
    const { low, high, method } = stratifiedInterval([
      [1, 2, 3, 4, 5],
      [10, 20, 30, 40, 50],
    ])!;
    expect(method).toBe('stratified-t');
    expect((low + high) / 2).toBeCloseTo(16.5, 9);
    const reach = (high - low) / Math.sqrt(50.5);
    expect(reach).toBeGreaterThan(2.74);
    expect(reach).toBeLessThan(2.776);
  });

  it('stratifiedInterval(tasks) is null where a task has one value, and constant where nothing scatters', () => {
    expect(stratifiedInterval([[1, 2], [3]])).toBeNull();
    expect(
      stratifiedInterval([
        [1, 1],
        [3, 3],
      ]),
    ).toEqual({ method: 'constant', level: 0.95, low: 2, high: 2 });
  });

  it('stratifiedInterval(tasks) refuses a level outside (0, 1) and no tasks', () => {
    expect(() => stratifiedInterval([[1, 2]], { level: 95 })).toThrow('level must lie between 0 and 1');
    expect(() => stratifiedInterval([])).toThrow(RangeError);
  });
});
