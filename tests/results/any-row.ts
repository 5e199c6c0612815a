import fc from 'fast-check';
import type { CellRow } from '../../harness/row.js';

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const count = fc.nat();
const label = fc.stringMatching(/^[A-Za-z0-9][A-Za-z0-9.+()=,-]{0,12}$/);
/** One line of any text: quotes, commas and spaces at its ends included. */
const line = fc
  .string({ unit: 'grapheme', maxLength: 20 })
  .map((text) => text.replace(/[\r\n\u2028\u2029]/g, ' '));

/** Any row that a rehearsal could write. */
export const anyRow: fc.Arbitrary<CellRow> = fc.record(
  {
    task: label,
    curtain: fc.constantFrom('open', 'ceiling=0.5 thin=200', 'region="a b":x/y;"c,d":0..1'),
    method: label,
    settings: fc.stringMatching(/^[0-9a-f]{8}$/),
    seed: fc.integer({ min: 1, max: 100_000 }),
    status: fc.constantFrom('done' as const, 'failed' as const),
    reason: line,
    best: finite,
    median: finite,
    bestVisible: finite,
    lift: finite,
    optimism: fc.option(finite, { nil: undefined }),
    visible: count,
    batch: count,
    distinct: count,
    floor: finite,
    top: finite,
    topKnown: fc.constantFrom('published' as const, 'exact' as const, 'best-known' as const),
  },
  { noNullPrototype: true },
);
