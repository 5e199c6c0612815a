import {
  type Designs,
  matrixFromRows,
  orderByDescending,
  rowView,
  stackRows,
} from '../../../harness/designs.js';
import { encode } from '../../../harness/encoding.js';
import type { Stream } from '../../../harness/random.js';
import { type Space, sampleUniform } from '../../../harness/space.js';
import { mutateValue } from '../../mutation.js';
import type { Table } from '../../parts.js';
import { bestVisible } from '../../table.js';
import { type Effort, improveDesign } from './improve-design.js';
import type { GaussianPosterior } from './posterior.js';

const parents = 20;
const climbers = 6;

/**
 * About `count` designs in which good ones should be found: two fifths drawn uniformly, two fifths changed copies of
 * the 20 best visible designs, and the rest changed copies of designs that climbed the posterior mean, together with
 * the best visible designs and the climbed ones themselves (common practice).
 */
export function makeCandidates(
  table: Table,
  posterior: GaussianPosterior,
  count: number,
  effort: Effort,
  stream: Stream,
): Designs {
  const { space } = table.encoding;
  const random = sampleUniform(space, Math.ceil(0.4 * count), stream.split('uniform'));
  const best = bestVisible(table, Math.min(parents, table.designs.rows));
  const climbed = climbMean(table, posterior, [best, random], effort, stream.split('climb'));
  return stackRows([
    random,
    mutateDesigns(space, best, Math.ceil(0.4 * count), stream.split('visible')),
    mutateDesigns(space, climbed, Math.ceil(0.2 * count), stream.split('climbed')),
    best,
    climbed,
  ]);
}

/** `count` copies of the parents, taken in turn, each with one to three columns mutated by steps of 0.3 % to 30 %. */
export function mutateDesigns(space: Space, from: Designs, count: number, stream: Stream): Designs {
  const rows = Array.from({ length: count }, (_, k) => {
    const row = rowView(from, k % from.rows).slice();
    const changes = 1 + stream.below(Math.min(3, space.columns.length));
    for (let c = 0; c < changes; c++) {
      const j = stream.below(space.columns.length);
      row[j] = mutateValue(space.columns[j]!, row[j]!, 0.3 * 100 ** -stream.uniform(), stream);
    }
    return row;
  });
  return matrixFromRows(rows, space.columns.length);
}

function climbMean(
  table: Table,
  posterior: GaussianPosterior,
  sources: readonly Designs[],
  effort: Effort,
  stream: Stream,
): Designs {
  const mean = { value: posterior.mean.bind(posterior), gradient: (x: Designs) => posterior.gradient(x, 0) };
  const rows = sources.flatMap((source) => {
    const order = orderByDescending(posterior.mean(encode(table.encoding, source)));
    return order.slice(0, climbers).map((i) => rowView(source, i));
  });
  return matrixFromRows(
    rows.map((row, k) => improveDesign(mean, table.encoding, row, effort, stream.split(k)).design),
    table.designs.columns,
  );
}
