import type { Stream } from '../harness/random.js';
import type { Column, IntegerColumn, Space } from '../harness/space.js';

/** How much a mutation changes. */
export interface MutationSize {
  /** Columns changed on average, before `atLeastOne`: each changes on its own with probability changes / d, at most 1. */
  readonly changes: number;
  /** Standard deviation of a numeric change, as a share of the column's range; above 0. */
  readonly step: number;
  /** When chance picks no column, change one at random. */
  readonly atLeastOne: boolean;
}

/** Mutates one design, (d), in place; it stays inside the space. */
export function mutateInPlace(row: Float64Array, space: Space, size: MutationSize, stream: Stream): void {
  const { columns } = space;
  let changed = 0;
  columns.forEach((column, j) => {
    if (stream.uniform() * columns.length >= size.changes) return;
    row[j] = mutateValue(column, row[j]!, size.step, stream);
    changed++;
  });
  if (changed > 0 || !size.atLeastOne) return;
  const j = stream.below(columns.length);
  row[j] = mutateValue(columns[j]!, row[j]!, size.step, stream);
}

/**
 * Another value of the column near the one given: continuous, a Gaussian step of deviation `step` · range, reflected
 * at the bounds; integer, the same step rounded, of at least 1 (common practice); category, one of the other levels,
 * each as likely.
 */
export function mutateValue(column: Column, value: number, step: number, stream: Stream): number {
  if (column.kind === 'category') {
    return (value + 1 + stream.below(column.levels.length - 1)) % column.levels.length;
  }
  if (column.kind === 'integer') return mutateInteger(column, value, step, stream);
  return reflect(value + step * (column.high - column.low) * stream.normal(), column.low, column.high);
}

/** A value folded back into [low, high] as often as it overshoots, like light between two mirrors. */
export function reflect(value: number, low: number, high: number): number {
  if (value >= low && value <= high) return value;
  const range = high - low;
  const phase = (((value - low) % (2 * range)) + 2 * range) % (2 * range);
  return Math.min(high, Math.max(low, low + (phase <= range ? phase : 2 * range - phase)));
}

/** Reflection can lead back to the value itself; then the step is drawn again. */
function mutateInteger({ low, high }: IntegerColumn, value: number, step: number, stream: Stream): number {
  let moved: number;
  do {
    const drawn = step * (high - low) * stream.normal();
    const whole = Math.sign(drawn) * Math.max(1, Math.round(Math.abs(drawn)));
    moved = reflect(value + whole, low, high);
  } while (moved === value);
  return moved;
}
