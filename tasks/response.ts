import { z } from 'zod';
import { type Stream, shuffleInPlace } from '../harness/random.js';
import { type ContinuousColumn, makeSpace } from '../harness/space.js';
import type { Task } from '../harness/task.js';
import { scoreRows } from './score-rows.js';

/** The inputs of a response, in the published order, with their ranges. */
export type Box = readonly ContinuousColumn[];

/** A closed-form engineering model over a box of physical inputs. */
export interface Response {
  /** The published inputs, ranges and units. */
  readonly box: Box;
  /** Which way the response is wanted; the score of a `smallest` one is its negative. */
  readonly aim: 'largest' | 'smallest';
  /** The response, its arguments the inputs in the published order. */
  readonly formula: (...inputs: number[]) => number;
  /** Inputs that are best within a box inside the published one, by an argument that holds for every such box. */
  best(box: Box): Float64Array;
}

/** Setting: whether the instance is a part of the published box. */
export const subBoxSetting = z
  .boolean()
  .default(true)
  .describe('trim each range and shuffle the columns by the seed; false keeps the box as published');

/** Largest part of a range that is trimmed off at each end. */
const largestTrim = 0.15;

/** A continuous input; `unit` is left out for a plain number. */
export function input(name: string, low: number, high: number, unit?: string): ContinuousColumn {
  return { kind: 'continuous', name, low, high, ...(unit === undefined ? {} : { unit }) };
}

/** The corner of a box with each input at the end named. */
export function cornerOf(box: Box, ends: readonly ('low' | 'high')[]): Float64Array {
  return Float64Array.from(box, (column, j) => column[ends[j]!]);
}

/**
 * The task of making a response as large or as small as the box allows.
 *
 * A `moved` instance is a box inside the published one, each end of each range moved inwards by a uniform share of
 * 0 to 15 % of the range, with the columns in random order. Names and units stay those of the input.
 */
export function responseTask(response: Response, moved: boolean, stream: Stream): Task {
  const d = response.box.length;
  const sign = response.aim === 'largest' ? 1 : -1;
  const box = moved ? trim(response.box, stream.split('ranges')) : response.box;
  const inputOf = Array.from({ length: d }, (_, j) => j);
  if (moved) shuffleInPlace(inputOf, stream.split('order'));
  const best = response.best(box);
  return {
    space: makeSpace(inputOf.map((i) => box[i]!)),
    truth(designs) {
      const x = new Float64Array(d);
      return scoreRows(designs, (row) => {
        for (let j = 0; j < d; j++) x[inputOf[j]!] = row[j]!;
        return sign * response.formula(...x);
      });
    },
    optimum: {
      value: sign * response.formula(...best),
      design: Float64Array.from(inputOf, (i) => best[i]!),
      known: 'exact',
    },
  };
}

function trim(box: Box, stream: Stream): Box {
  return box.map((column) => {
    const range = column.high - column.low;
    const low = column.low + largestTrim * stream.uniform() * range;
    const high = column.high - largestTrim * stream.uniform() * range;
    return { ...column, low, high };
  });
}
