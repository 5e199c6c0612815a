import { OnebatchError } from '../errors.js';
import { type Stream, sampleWithout } from '../random.js';
import { type CategoryColumn, type Column, countValues, type Space } from '../space.js';
import type { Task } from '../task.js';
import type { DrawnRegionSpec, RegionSpec, WhereSpec } from './curtain-spec.js';

/** What is hidden on one column: an interval, bounds included, or a set of levels. */
export type Side =
  | { readonly column: number; readonly low: number; readonly high: number }
  | { readonly column: number; readonly levels: ReadonlySet<number> };

/** A box: the rows inside it are those inside on every side. */
export type Region = readonly Side[];

/** Whether a design lies inside the box on every side. */
export function isInside(region: Region, row: Float64Array): boolean {
  return region.every((side) => {
    const value = row[side.column]!;
    return 'levels' in side ? side.levels.has(value) : value >= side.low && value <= side.high;
  });
}

/**
 * The box that a spec writes out or asks to be drawn. A drawn box covers `share` of the range of each of its columns:
 * of an integer column that share of its values, of a category that share of its levels, both rounded, at least one
 * and never all. It lies uniformly among all places it can have; those around the optimum hold its coordinate.
 *
 * @throws OnebatchError (`bad-settings`) for a column, level or interval that the space doesn't have, for more columns
 * than there are, and for a box around an optimum whose design is not known.
 */
export function drawRegion(task: Task, spec: RegionSpec, stream: Stream): Region {
  return 'where' in spec ? writtenRegion(task.space, spec.where) : drawnRegion(task, spec, stream);
}

function writtenRegion(space: Space, where: WhereSpec): Region {
  return Object.entries(where).map(([name, bounds]) => {
    const index = space.columns.findIndex((column) => column.name === name);
    const column = space.columns[index];
    if (column === undefined) {
      throw unfit(
        `hides rows by column "${name}", which the space doesn't have; it has ${listed(space.columns)}`,
      );
    }
    if (column.kind === 'category') return { column: index, levels: levelsOf(column, bounds) };
    const [low, high] = bounds;
    if (bounds.length !== 2 || typeof low !== 'number' || typeof high !== 'number' || !(low <= high)) {
      throw unfit(`needs [low, high] for column "${name}", got ${JSON.stringify(bounds)}`);
    }
    if (high < column.low || low > column.high) {
      throw unfit(
        `hides ${low} to ${high} on "${name}", which only goes from ${column.low} to ${column.high}`,
      );
    }
    return { column: index, low, high };
  });
}

function levelsOf(column: CategoryColumn, names: WhereSpec[string]): ReadonlySet<number> {
  return new Set(
    names.map((name) => {
      const level = column.levels.indexOf(String(name));
      if (level < 0) {
        throw unfit(
          `hides level "${name}" of "${column.name}", whose levels are ${column.levels.join(', ')}`,
        );
      }
      return level;
    }),
  );
}

function drawnRegion({ space, optimum }: Task, spec: DrawnRegionSpec, stream: Stream): Region {
  if (spec.columns > space.columns.length) {
    throw unfit(`asks for ${spec.columns} columns but the space has ${space.columns.length}; ask for fewer`);
  }
  if (spec.around === 'optimum' && optimum.design === undefined) {
    throw unfit(
      "asks for a box around the optimum, but this task's best design is not known; use around: random",
    );
  }
  const centre = spec.around === 'optimum' ? optimum.design : undefined;
  return sampleWithout(stream.split('columns'), space.columns.length, spec.columns).map((index) => {
    const column = space.columns[index]!;
    return drawSide(column, index, spec.share, centre?.[index], stream.split('column', index));
  });
}

function drawSide(
  column: Column,
  index: number,
  share: number,
  centre: number | undefined,
  stream: Stream,
): Side {
  if (column.kind === 'continuous') {
    const width = share * (column.high - column.low);
    const first = Math.max(column.low, (centre ?? column.low) - width);
    const last = Math.min(column.high - width, centre ?? column.high);
    const low = first + stream.uniform() * (last - first);
    return { column: index, low: Math.min(low, centre ?? low), high: Math.max(low + width, centre ?? low) };
  }
  const count = countValues(column);
  const covered = Math.min(count - 1, Math.max(1, Math.round(share * count)));
  if (column.kind === 'integer') {
    const first = Math.max(column.low, (centre ?? column.low) - covered + 1);
    const last = Math.min(column.high - covered + 1, centre ?? column.high);
    const low = first + stream.below(last - first + 1);
    return { column: index, low, high: low + covered - 1 };
  }
  const order = sampleWithout(stream, count, count);
  const chosen = centre === undefined ? order : [centre, ...order.filter((level) => level !== centre)];
  return { column: index, levels: new Set(chosen.slice(0, covered)) };
}

function listed(columns: readonly Column[]): string {
  const names = columns.slice(0, 6).map((column) => column.name);
  return names.join(', ') + (columns.length > names.length ? `, … (${columns.length} in all)` : '');
}

function unfit(problem: string): OnebatchError {
  return new OnebatchError('bad-settings', `the curtain's region ${problem}`);
}
