import { z } from 'zod';
import {
  type Designs,
  orderByDescending,
  rowView,
  stackRows,
  takeRows,
  zeros,
} from '../../harness/designs.js';
import type { TraceStep } from '../../harness/method.js';
import type { Stream } from '../../harness/random.js';
import { type Space, sampleUniform } from '../../harness/space.js';
import { bestDistinct } from '../best-distinct.js';
import { mutateInPlace } from '../mutation.js';
import { defineSearch, type Table } from '../parts.js';
import { appraise, recordBest } from './appraise.js';
import { Archive } from './archive.js';

const settings = z.strictObject({
  population: z.int().min(2).default(100).describe('designs in a generation'),
  generations: z.int().min(0).default(50).describe('generations after the first'),
  random: z
    .number()
    .min(0)
    .max(1)
    .default(0.2)
    .describe('share of the first generation drawn at random; the rest are the best visible designs'),
  tournament: z.int().min(1).default(3).describe('designs of which the best becomes a parent'),
  crossover: z
    .number()
    .min(0)
    .max(1)
    .default(0.9)
    .describe('probability that a child has two parents rather than one'),
  mutations: z.number().min(0).default(1).describe('columns changed in a child, on average'),
  step: z
    .number()
    .positive()
    .default(0.1)
    .describe("standard deviation of a numeric mutation, as a share of the column's range"),
  elite: z.int().min(0).default(2).describe('best designs that pass into the next generation unchanged'),
  traceEvery: z.int().min(1).default(5).describe('generations between two records of the climb'),
});
type Settings = z.output<typeof settings>;

/** A generation with its objective values. */
interface Generation {
  readonly designs: Designs;
  readonly values: Float64Array;
}

/**
 * A generational genetic algorithm on the designs themselves: parents by tournament (Goldberg & Deb 1991), uniform
 * crossover (Syswerda 1989), a mutation of each column with the same probability, and elitism (De Jong 1975). The
 * batch is the best distinct designs of the whole run.
 */
export const genetic = defineSearch({
  name: 'genetic',
  description:
    'genetic algorithm from the best visible designs: tournaments, uniform crossover, mutation, an elite',
  source: 'Holland 1975; Goldberg 1989',
  settings,
  climb(objective, table, batchSize, options, stream) {
    const { space } = table.encoding;
    const archive = new Archive(batchSize, space.columns.length);
    const seen = bestDistinct(table, batchSize).designs;
    archive.add(seen, appraise(objective, table, seen));
    const value = (designs: Designs): Generation => {
      const values = appraise(objective, table, designs);
      archive.add(designs, values);
      return { designs, values };
    };
    let current = value(firstGeneration(table, options, stream.split('first')));
    const trace: TraceStep[] = [recordBest(objective, table, archive, 0)];
    for (let generation = 1; generation <= options.generations; generation++) {
      current = value(nextGeneration(current, space, options, stream));
      if (generation % options.traceEvery === 0 || generation === options.generations) {
        trace.push(recordBest(objective, table, archive, generation));
      }
    }
    return { designs: archive.batch(), trace };
  },
});

function firstGeneration(table: Table, { population, random }: Settings, stream: Stream): Designs {
  const visible = bestDistinct(table, population - Math.round(random * population)).designs;
  return stackRows([visible, sampleUniform(table.encoding.space, population - visible.rows, stream)]);
}

function nextGeneration(current: Generation, space: Space, options: Settings, stream: Stream): Designs {
  const { population, elite, mutations, step } = options;
  const kept = orderByDescending(current.values).slice(0, Math.min(elite, population));
  const children = zeros(population - kept.length, space.columns.length);
  for (let i = 0; i < children.rows; i++) {
    const child = rowView(children, i);
    child.set(rowView(current.designs, selectParent(current.values, options.tournament, stream)));
    if (stream.uniform() < options.crossover) {
      const other = rowView(current.designs, selectParent(current.values, options.tournament, stream));
      for (let j = 0; j < child.length; j++) if (stream.below(2) === 1) child[j] = other[j]!;
    }
    mutateInPlace(child, space, { changes: mutations, step, atLeastOne: false }, stream);
  }
  return stackRows([takeRows(current.designs, kept), children]);
}

/** The best of `size` designs drawn with replacement. */
function selectParent(values: Float64Array, size: number, stream: Stream): number {
  let best = stream.below(values.length);
  for (let k = 1; k < size; k++) {
    const rival = stream.below(values.length);
    if (values[rival]! > values[best]!) best = rival;
  }
  return best;
}
