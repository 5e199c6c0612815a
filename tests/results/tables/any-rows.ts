import fc from 'fast-check';
import type { CellRow } from '../../../harness/row.js';
import { makeRow } from '../made-ledger.js';

const label = fc.oneof(
  fc.string({ minLength: 1, maxLength: 45 }),
  fc.string({ unit: 'grapheme', minLength: 1, maxLength: 45 }),
  fc.constantFrom(
    'a|b',
    'x,"y"',
    'line\nbreak',
    '材料最適化の方法',
    '👩‍🔬👩‍🔬👩‍🔬',
    '\u001b[31mred',
    'e\u0301',
  ),
);

const score = fc.oneof(
  fc.double({ min: -1, max: 1.2, noNaN: true }),
  fc.double({ min: -1e9, max: 1e9, noNaN: true }),
  fc.constantFrom(0, -1.5e5, 12.3, 999.96, -9.9996, -1e100),
);

/** Ledgers with any labels, scores of any size, failures, missing beliefs, and methods that lack seeds. */
export const anyRows: fc.Arbitrary<CellRow[]> = fc
  .record({
    tasks: fc.uniqueArray(label, { minLength: 1, maxLength: 2 }),
    methods: fc.uniqueArray(label, { minLength: 1, maxLength: 4 }),
    curtain: label,
    seeds: fc.integer({ min: 1, max: 3 }),
    bestVisible: score,
  })
  .chain(({ tasks, methods, curtain, seeds, bestVisible }) => {
    const cells = tasks.flatMap((task) =>
      methods.flatMap((method) => Array.from({ length: seeds }, (_, seed) => ({ task, method, seed }))),
    );
    const parts = fc.record({
      best: score,
      median: score,
      optimism: fc.option(score, { nil: undefined }),
      status: fc.constantFrom('done' as const, 'failed' as const),
      reason: label,
    });
    return fc
      .array(parts, { minLength: cells.length, maxLength: cells.length })
      .map((all) => cells.map((cell, i) => makeRow({ ...cell, curtain, bestVisible, ...all[i]! })))
      .chain((rows) => fc.subarray(rows, { minLength: 1 }));
  });
