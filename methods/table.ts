import type { Designs } from '../harness/designs.js';
import { orderByDescending, takeRows } from '../harness/designs.js';
import { encode, makeEncoding } from '../harness/encoding.js';
import type { Offer } from '../harness/method.js';
import type { Table } from './parts.js';

/** The offer's visible rows, encoded. */
export function makeTable(offer: Offer): Table {
  const encoding = makeEncoding(offer.space);
  return { encoding, designs: offer.designs, x: encode(encoding, offer.designs), scores: offer.scores };
}

/**
 * The `count` visible designs with the highest measured scores, best first; a table with fewer rows is gone through
 * again from its best row on.
 */
export function bestVisible(table: Pick<Table, 'designs' | 'scores'>, count: number): Designs {
  const order = orderByDescending(table.scores);
  return takeRows(
    table.designs,
    Array.from({ length: count }, (_, i) => order[i % order.length]!),
  );
}

/** Mean and standard deviation (n − 1) of the scores; a constant or single score has deviation 1. */
export function scoreScale(scores: Float64Array): { mean: number; deviation: number } {
  const mean = scores.reduce((sum, y) => sum + y, 0) / scores.length;
  const squares = scores.reduce((sum, y) => sum + (y - mean) ** 2, 0);
  const deviation = Math.sqrt(squares / Math.max(1, scores.length - 1));
  return { mean, deviation: deviation > 0 ? deviation : 1 };
}
