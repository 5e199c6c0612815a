import { type Designs, matrixFromRows, rowView, zeros } from '../../harness/designs.js';
import type { Task } from '../../harness/task.js';

/** Every sequence of `length` letters from 0 … alphabet − 1, the first letter the most significant digit. */
export function everySequence(length: number, alphabet: number): Designs {
  const designs = zeros(alphabet ** length, length);
  for (let i = 0; i < designs.rows; i++) {
    const row = rowView(designs, i);
    for (let j = length - 1, rest = i; j >= 0; j--, rest = Math.floor(rest / alphabet))
      row[j] = rest % alphabet;
  }
  return designs;
}

/** The true score of one design. */
export function scoreOf(task: Task, design: ArrayLike<number>): number {
  return task.truth(matrixFromRows([design]))[0]!;
}

/** The largest value. */
export function largest(values: Float64Array): number {
  return values.reduce((a, b) => Math.max(a, b));
}

/** Mean, standard error of the mean and variance (n − 1) of a sample. */
export function summarize(sample: readonly number[]): {
  mean: number;
  standardError: number;
  variance: number;
} {
  const mean = sample.reduce((sum, value) => sum + value, 0) / sample.length;
  const variance = sample.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (sample.length - 1);
  return { mean, standardError: Math.sqrt(variance / sample.length), variance };
}

/**
 * Which pairs of sites interact: f(neither changed) + f(both changed) differs from f(first changed) + f(second changed)
 * by more than rounding. Each site is changed from letter 0 to letter 1.
 */
export function interactingPairs(task: Task): string[] {
  const length = task.space.columns.length;
  const at = (...ones: number[]): number =>
    scoreOf(
      task,
      Float64Array.from({ length }, (_, j) => (ones.includes(j) ? 1 : 0)),
    );
  const pairs: string[] = [];
  for (let i = 0; i < length; i++) {
    for (let j = i + 1; j < length; j++) {
      if (Math.abs(at() + at(i, j) - at(i) - at(j)) > 1e-9) pairs.push(`${i}-${j}`);
    }
  }
  return pairs;
}
