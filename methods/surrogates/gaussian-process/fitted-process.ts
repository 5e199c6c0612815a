import { orderByDescending, takeRows } from '../../../harness/designs.js';
import type { Stream } from '../../../harness/random.js';
import type { Table } from '../../parts.js';
import { scoreScale } from '../../table.js';
import { drawRows, fitHyperParameters } from './fit-hyper-parameters.js';
import type { HyperParameters } from './hyper-parameters.js';
import { type KernelLayout, makeKernelLayout } from './kernel-layout.js';
import { makePairDistances } from './marginal-likelihood.js';
import { GaussianPosterior } from './posterior.js';

/** How a process is fitted; see the settings of the surrogate `gaussian-process`. */
export interface ProcessSettings {
  readonly starts: number;
  readonly iterations: number;
  readonly fitRows: number;
  readonly mostRows: number;
  readonly sharedAbove: number;
}

/** A Gaussian process fitted to a table. */
export interface FittedProcess {
  readonly hyperParameters: HyperParameters;
  /** Mean and deviation that turn the posterior's standardized units into score units. */
  readonly scale: { readonly mean: number; readonly deviation: number };
  /** The posterior given the table; each call makes one of its own, with room for `room` believed designs. */
  makePosterior(room?: number): GaussianPosterior;
}

/**
 * Fits hyper-parameters on a seeded draw of `fitRows` rows, and conditions on all rows up to `mostRows`; of a larger
 * table, on the better half of that many and a seeded draw of the others.
 */
export function fitProcess(table: Table, settings: ProcessSettings, stream: Stream): FittedProcess {
  const layout = makeKernelLayout(table.encoding, settings.sharedAbove);
  const scale = scoreScale(table.scores);
  const targets = table.scores.map((score) => (score - scale.mean) / scale.deviation);
  const fitted = drawRows(table.x.rows, settings.fitRows, stream.split('fit-rows'));
  const distances = makePairDistances(layout, takeRows(table.x, fitted));
  const { hyperParameters } = fitHyperParameters(
    distances,
    takeValues(targets, fitted),
    settings.starts,
    settings.iterations,
    stream.split('starts'),
  );
  const kept = keepRows(targets, settings.mostRows, stream.split('kept-rows'));
  const x = takeRows(table.x, kept);
  const y = takeValues(targets, kept);
  return { hyperParameters, scale, makePosterior: makePosteriorOf(layout, hyperParameters, x, y) };
}

function makePosteriorOf(
  layout: KernelLayout,
  hyperParameters: HyperParameters,
  x: Table['x'],
  y: Float64Array,
): FittedProcess['makePosterior'] {
  return (room = 0) => new GaussianPosterior(layout, hyperParameters, x, y, room);
}

function keepRows(targets: Float64Array, most: number, stream: Stream): number[] {
  const order = orderByDescending(targets);
  if (order.length <= most) return order.sort((a, b) => a - b);
  const best = order.slice(0, Math.ceil(most / 2));
  const rest = order.slice(best.length);
  const drawn = drawRows(rest.length, most - best.length, stream).map((k) => rest[k]!);
  return [...best, ...drawn].sort((a, b) => a - b);
}

function takeValues(values: Float64Array, indices: readonly number[]): Float64Array {
  return Float64Array.from(indices, (i) => values[i]!);
}
