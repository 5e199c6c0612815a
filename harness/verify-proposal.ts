import type { Designs } from './designs.js';
import type { Proposal } from './method.js';
import { findBreach, type Space } from './space.js';

/**
 * What is wrong with a method's proposal, in words, or `undefined` when it keeps the contract. Nothing about it is
 * taken on trust: a method may be anybody's.
 */
export function findFault(proposal: unknown, space: Space, batchSize: number): string | undefined {
  if (typeof proposal !== 'object' || proposal === null) return 'returned no proposal';
  const { designs, believed, spread, trace } = proposal as Partial<Proposal>;
  return (
    findFaultInDesigns(designs, space, batchSize) ??
    (believed === undefined ? undefined : findFaultInNumbers('believed', believed, batchSize)) ??
    (spread === undefined ? undefined : findFaultInSpread(spread, batchSize)) ??
    findFaultInTrace(trace, space)
  );
}

function findFaultInDesigns(designs: unknown, space: Space, rows?: number): string | undefined {
  if (typeof designs !== 'object' || designs === null) return 'returned no designs';
  const { rows: n, columns: d, values } = designs as Partial<Designs>;
  if (!(values instanceof Float64Array) || typeof n !== 'number' || typeof d !== 'number') {
    return 'returned designs that are no matrix of 64-bit floats';
  }
  if (rows !== undefined && n !== rows) return `returned ${n} designs, ${rows} were asked for`;
  if (d !== space.columns.length)
    return `returned designs of ${d} columns, the space has ${space.columns.length}`;
  if (values.length !== n * d) return `returned ${values.length} values for ${n} designs of ${d} columns`;
  const breach = findBreach(space, { rows: n, columns: d, values });
  if (breach === undefined) return undefined;
  return `design ${breach.row + 1}, column "${breach.column}": ${breach.value} ${breach.problem}`;
}

function findFaultInNumbers(name: string, values: unknown, rows: number): string | undefined {
  if (!(values instanceof Float64Array) || values.length !== rows)
    return `"${name}" is not one number a design`;
  const at = values.findIndex((value) => !Number.isFinite(value));
  return at < 0 ? undefined : `"${name}" of design ${at + 1} is ${values[at]}, not a finite number`;
}

function findFaultInSpread(spread: unknown, rows: number): string | undefined {
  const fault = findFaultInNumbers('spread', spread, rows);
  if (fault !== undefined) return fault;
  const at = (spread as Float64Array).findIndex((value) => value < 0);
  return at < 0 ? undefined : `"spread" of design ${at + 1} is ${(spread as Float64Array)[at]}, less than 0`;
}

function findFaultInTrace(trace: unknown, space: Space): string | undefined {
  if (trace === undefined) return undefined;
  if (!Array.isArray(trace)) return '"trace" is not a list of steps';
  for (const step of trace as readonly unknown[]) {
    const {
      designs,
      believed,
      step: number,
    } = (step ?? {}) as Partial<NonNullable<Proposal['trace']>[number]>;
    if (!Number.isFinite(number)) return 'a step of "trace" has no number';
    const fault =
      findFaultInDesigns(designs, space) ?? findFaultInNumbers('believed', believed, designs!.rows);
    if (fault !== undefined) return `trace step ${number}: ${fault}`;
  }
  return undefined;
}
