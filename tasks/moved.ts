import { z } from 'zod';
import { type Stream, shuffleInPlace } from '../harness/random.js';
import { makeSpace } from '../harness/space.js';
import type { Task } from '../harness/task.js';
import { scoreRows } from './score-rows.js';

/** A function that its literature minimises over a box. */
export interface BoxFunction {
  /** The published box: lower and upper bound of each input. */
  readonly bounds: readonly (readonly [low: number, high: number])[];
  /**
   * The function at one point, (d). Defined on all of R^d, where its least value is that of the box: without that a
   * shift could bring something lower into the box.
   */
  evaluate(x: Float64Array): number;
  /** The least value. */
  readonly minimum: number;
  /** Points strictly inside the box that reach it; at least one. */
  readonly minimizers: readonly (readonly number[])[];
}

/** Largest shift of a coordinate, as a share of its range. */
const largestShift = 0.2;
/** Share of the range that a shift leaves between the optimum and the edge, unless it starts nearer. */
const margin = 0.05;

/** Setting: whether the instance is moved. */
export const movedSetting = z
  .boolean()
  .default(true)
  .describe('swap, reflect and shift the axes by the seed; false keeps the function as published');

/** Setting: number of columns, from `least` to 5,000. */
export function dimensionsSetting(least = 1) {
  return z.int().min(least).max(5000).default(10).describe('number of columns');
}

/**
 * The task of maximising −f for a box function f, with columns x1 … xd.
 *
 * A moved instance looks at f through axes that are swapped, reflected within the box (each with probability 1/2)
 * and shifted, each uniformly by at most 20 % of its range and so that the optimum stays 5 % of the range away from
 * the edge, or as far as it was. Bounds travel with their axis. One of the minimisers, drawn, is carried along:
 * column j stands for input i as x_i = x*_i ± (z_j − z*_j), so that the design z* gives the minimiser x* to the
 * last bit. Takes O(d) memory and time a design.
 */
export function movedTask(base: BoxFunction, moved: boolean, stream: Stream): Task {
  return moved ? moveTask(base, stream) : stillTask(base);
}

function stillTask(base: BoxFunction): Task {
  return {
    space: boxSpace(base.bounds),
    truth: (designs) => scoreRows(designs, (row) => 0 - base.evaluate(row)),
    optimum: {
      value: 0 - base.minimum,
      design: Float64Array.from(base.minimizers[0]!),
      known: 'published',
    },
  };
}

function moveTask({ bounds, evaluate, minimum, minimizers }: BoxFunction, stream: Stream): Task {
  const d = bounds.length;
  const minimizer = Float64Array.from(minimizers[stream.split('minimizer').below(minimizers.length)]!);
  const inputOf = shuffleInPlace(
    Int32Array.from({ length: d }, (_, j) => j),
    stream.split('order'),
  );
  const signs = new Float64Array(d);
  const design = new Float64Array(d);
  const [reflections, shifts] = [stream.split('reflections'), stream.split('shifts')];
  for (let j = 0; j < d; j++) {
    const [low, high] = bounds[inputOf[j]!]!;
    const start = minimizer[inputOf[j]!]!;
    signs[j] = reflections.below(2) === 0 ? 1 : -1;
    design[j] = drawPlace(signs[j] === 1 ? start : low + high - start, low, high, shifts.uniform());
  }
  return {
    space: boxSpace(Array.from(inputOf, (input) => bounds[input]!)),
    truth(designs) {
      const x = new Float64Array(d);
      return scoreRows(designs, (row) => {
        for (let j = 0; j < d; j++) {
          const input = inputOf[j]!;
          x[input] = minimizer[input]! + signs[j]! * (row[j]! - design[j]!);
        }
        return 0 - evaluate(x);
      });
    },
    optimum: { value: 0 - minimum, design: design.slice(), known: 'published' },
  };
}

/** Where a coordinate of the optimum goes: uniform among the places it may be shifted to, for `share` in [0, 1). */
function drawPlace(start: number, low: number, high: number, share: number): number {
  const range = high - low;
  const least = Math.max(start - largestShift * range, Math.min(start, low + margin * range));
  const most = Math.min(start + largestShift * range, Math.max(start, high - margin * range));
  return least + share * (most - least);
}

function boxSpace(bounds: BoxFunction['bounds']) {
  return makeSpace(
    bounds.map(([low, high], j) => ({ kind: 'continuous' as const, name: `x${j + 1}`, low, high })),
  );
}
