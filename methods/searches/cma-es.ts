import { z } from 'zod';
import { copyMatrix, type Designs, type Matrix, rowView, stackRows } from '../../harness/designs.js';
import { decode, type Encoding, encode } from '../../harness/encoding.js';
import type { TraceStep } from '../../harness/method.js';
import type { Stream } from '../../harness/random.js';
import { bestDistinct } from '../best-distinct.js';
import { reflect } from '../mutation.js';
import { defineSearch, type Table } from '../parts.js';
import { scoreScale } from '../table.js';
import { appraise, recordBest } from './appraise.js';
import { Archive } from './archive.js';
import { CmaEs } from './cma-es-state.js';

const settings = z.strictObject({
  starts: z
    .int()
    .min(1)
    .default(4)
    .describe('runs side by side, each from another of the best visible designs'),
  generations: z.int().min(0).default(100).describe('generations of every run'),
  population: z
    .int()
    .min(0)
    .refine((size) => size === 0 || size >= 4, 'must be 0 or at least 4')
    .default(0)
    .describe('designs a run draws in a generation; 0: 4 + ⌊3 ln n⌋ for n encoded features'),
  sigma: z
    .number()
    .positive()
    .default(0.3)
    .describe('first step size in unit-cube units (Hansen 2016, figure 6: 0.3 of the search interval)'),
  fullUpTo: z
    .int()
    .min(0)
    .default(50)
    .describe('encoded features up to which the full covariance is learned; beyond, its diagonal only'),
  traceEvery: z.int().min(1).default(10).describe('generations between two records of the climb'),
});

/**
 * Climbs the encoded space (unit cube and relaxed one-hot) with several CMA-ES runs side by side; the batch is the best
 * distinct designs that any of them drew, or started from.
 *
 * A drawn point is valued at the design it stands for. At the bounds of a scaled column it is mirrored back inside
 * (reflection, compared with other rules by Biedrzycki 2020), while the run itself goes on with the unmirrored point:
 * it climbs a function on all of Rⁿ that repeats itself beyond the bounds, and stays blind to the scale of scores. The
 * features of a category have no bounds, since only the largest of them counts. A run with nothing left to find starts
 * again from the next best visible design.
 */
export const cmaEs = defineSearch({
  name: 'cma-es',
  description: 'evolution strategy with a learned covariance, several runs from the best visible designs',
  source:
    'Hansen 2016 (arXiv:1604.00772); diagonal for many features: Ros & Hansen 2008; bounds: Biedrzycki 2020',
  settings,
  climb(objective, table, batchSize, { starts, generations, traceEvery, ...options }, stream) {
    const { encoding } = table;
    const { deviation } = scoreScale(table.scores);
    const archive = new Archive(batchSize, table.designs.columns);
    const seen = bestDistinct(table, batchSize).designs;
    archive.add(seen, appraise(objective, table, seen));
    const trace: TraceStep[] = [recordBest(objective, table, archive, 0)];
    const nextRun = makeRuns(table, Math.max(starts, batchSize), options, stream);
    const runs = Array.from({ length: starts }, nextRun);

    for (let generation = 1; generation <= generations; generation++) {
      const drawn = runs.map(({ strategy, stream: own }) => strategy.ask(own));
      const designs = standsFor(encoding, stackRows(drawn));
      const values = appraise(objective, table, designs);
      archive.add(designs, values);
      let from = 0;
      drawn.forEach((points, i) => {
        const { strategy } = runs[i]!;
        const own = values.subarray(from, from + points.rows);
        from += points.rows;
        strategy.tell(
          points,
          own.map((value) => value / deviation),
        );
        if (strategy.stopReason() !== undefined) runs[i] = nextRun();
      });
      if (generation % traceEvery === 0 || generation === generations) {
        trace.push(recordBest(objective, table, archive, generation));
      }
    }
    return { designs: archive.batch(), trace };
  },
});

interface Run {
  readonly strategy: CmaEs;
  readonly stream: Stream;
}

/** Makes runs, each from the next of the `count` best visible designs, and then from the best again. */
function makeRuns(
  table: Table,
  count: number,
  { sigma, population, fullUpTo }: Pick<z.output<typeof settings>, 'sigma' | 'population' | 'fullUpTo'>,
  stream: Stream,
): () => Run {
  const { encoding } = table;
  const centres = encode(encoding, bestDistinct(table, count).designs);
  let made = 0;
  return () => {
    const number = made++;
    const strategy = new CmaEs({
      mean: rowView(centres, number % centres.rows),
      sigma,
      shape: encoding.width <= fullUpTo ? 'full' : 'diagonal',
      ...(population === 0 ? {} : { population }),
    });
    return { strategy, stream: stream.split('run', number) };
  };
}

/** The designs that points of Rⁿ stand for: scaled columns mirrored into [0, 1], then the nearest design. */
function standsFor(encoding: Encoding, points: Matrix): Designs {
  const mirrored = copyMatrix(points);
  for (let i = 0; i < mirrored.rows; i++) {
    const row = rowView(mirrored, i);
    for (const { column, offset } of encoding.blocks) {
      if (column.kind !== 'category') row[offset] = reflect(row[offset]!, 0, 1);
    }
  }
  return decode(encoding, mirrored);
}
