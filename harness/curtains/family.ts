import { copyMatrix, type Designs, rowView } from '../designs.js';
import { OnebatchError } from '../errors.js';
import { type Stream, sampleWithout } from '../random.js';
import { type Column, countValues, type Space, sampleColumn } from '../space.js';
import type { FamilySpec } from './curtain-spec.js';

/** A pool whose later half descends from a few rows of its first half. */
export interface Grown {
  readonly designs: Designs;
  /** The parents' row numbers. */
  readonly parents: readonly number[];
}

/**
 * A copy of the designs in which the later half (rounded down) is replaced by variants, as in variant libraries: each
 * copies a parent drawn at random and then takes another value, drawn uniformly, in 1 … `changes` columns. Parents are
 * different rows of the first half. Two variants can turn out the same.
 *
 * @throws OnebatchError (`bad-settings`) when the first half has fewer rows than there are to be parents.
 */
export function growFamily(space: Space, designs: Designs, spec: FamilySpec, stream: Stream): Grown {
  const variants = Math.floor(designs.rows / 2);
  const founders = designs.rows - variants;
  if (spec.parents > founders) {
    throw new OnebatchError(
      'bad-settings',
      `family asks for ${spec.parents} parents but half of the pool has only ${founders} rows; draw a larger pool or ask for fewer parents`,
    );
  }
  const parents = sampleWithout(stream.split('parents'), founders, spec.parents);
  const grown = copyMatrix(designs);
  const draws = stream.split('variants');
  for (let i = founders; i < designs.rows; i++) {
    const parent = parents[draws.below(parents.length)]!;
    const row = rowView(grown, i);
    row.set(rowView(designs, parent));
    changeInPlace(space, row, spec.changes, draws);
  }
  return { designs: grown, parents };
}

/** Whether row `i` differs from one of the parents in at most `changes` columns. */
export function isNearParent(
  designs: Designs,
  i: number,
  parents: readonly number[],
  changes: number,
): boolean {
  const row = rowView(designs, i);
  return parents.some((parent) => {
    const other = rowView(designs, parent);
    return row.reduce((count, value, j) => count + (value === other[j] ? 0 : 1), 0) <= changes;
  });
}

function changeInPlace(space: Space, row: Float64Array, changes: number, stream: Stream): void {
  const count = 1 + stream.below(Math.min(changes, row.length));
  for (const j of sampleWithout(stream, row.length, count)) {
    row[j] = anotherValue(space.columns[j]!, row[j]!, stream);
  }
}

function anotherValue(column: Column, value: number, stream: Stream): number {
  if (column.kind === 'continuous') return sampleColumn(column, stream);
  const low = column.kind === 'integer' ? column.low : 0;
  const drawn = low + stream.below(countValues(column) - 1);
  return drawn < value ? drawn : drawn + 1;
}
