import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { judge, judgeFailure } from '../../harness/judge.js';
import { dialCell, dialStage } from './toy-stage.js';

/** Designs with these dials. */
const dials = (...values: number[]) => matrixFromRows(values.map((dial) => [dial, 1, 0]));
const judged = (proposal: unknown, batchSize: number) => judge(dialCell, dialStage, proposal, batchSize);

describe('judge', () => {
  test('takes the largest, the median and what was gained over the best visible from true scores', () => {
    const { row } = judged({ designs: dials(1, 4, 9, 2) }, 4);
    // By hand: true scores 0.1, 0.4, 0.9, 0.2; type-7 median of an even number is the mean of the middle two.
    expect(row.best).toBe(0.9);
    expect(row.median).toBeCloseTo(0.3, 15);
    expect(row.lift).toBeCloseTo(0.9 - 0.5, 15);
    expect(row).toMatchObject({
      ...dialCell.key,
      status: 'done',
      reason: '',
      bestVisible: 0.5,
      visible: 3,
      batch: 4,
      distinct: 4,
      floor: 0,
      top: 10,
      topKnown: 'exact',
    });
  });

  test('takes the middle score of an odd batch', () => {
    expect(judged({ designs: dials(1, 9, 2) }, 3).row.median).toBe(0.2);
  });

  test('has a negative lift for a batch below the best visible', () => {
    expect(judged({ designs: dials(1, 2) }, 2).row.lift).toBeCloseTo(0.2 - 0.5, 15);
  });

  test('takes optimism as the mean of believed less true, normalized', () => {
    const proposal = { designs: dials(1, 2, 3, 4), believed: Float64Array.of(3, 2, 7, 2) };
    // By hand: (2 + 0 + 4 − 2) / 4 = 1 in the task's own scores.
    expect(judged(proposal, 4).row.optimism).toBeCloseTo(0.1, 15);
  });

  test('leaves optimism out where no belief was stated', () => {
    expect(judged({ designs: dials(1) }, 1).row.optimism).toBeUndefined();
  });

  test('counts equal designs once', () => {
    expect(judged({ designs: dials(1, 1, 2, 2, 2) }, 5).row.distinct).toBe(2);
  });

  test('normalizes beliefs, spreads and the trace; a spread by the range alone', () => {
    const shifted = { ...dialStage, floor: 5, top: 10, normalize: (score: number) => (score - 5) / 5 };
    const proposal = {
      designs: dials(1),
      believed: Float64Array.of(15),
      spread: Float64Array.of(10),
      trace: [{ step: 7, designs: dials(2, 4), believed: Float64Array.of(5, 10) }],
    };
    const verdict = judge(dialCell, shifted, proposal, 1);
    expect(verdict.batch).toEqual({
      proposal,
      truth: Float64Array.of(0.1),
      believed: Float64Array.of(2),
      spread: Float64Array.of(2),
    });
    expect(verdict.trace).toEqual([
      { step: 7, believed: Float64Array.of(0, 1), truth: Float64Array.of(0.2, 0.4) },
    ]);
  });

  test('does not depend on the order of the batch', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 10, noNaN: true }), { minLength: 1 }), (values) => {
        const one = judged({ designs: dials(...values) }, values.length).row;
        const other = judged({ designs: dials(...values.toReversed()) }, values.length).row;
        expect(other).toEqual(one);
        expect(one.median).toBeLessThanOrEqual(one.best);
      }),
    );
  });

  test('makes a proposal that breaks the contract a failed cell with the reason', () => {
    const verdict = judged({ designs: dials(1, 11) }, 2);
    expect(verdict).toEqual(
      judgeFailure(dialCell, dialStage, 'design 2, column "dial": 11 lies outside 0 to 10', 2),
    );
  });

  test('fails beliefs too large to be averaged, which no ledger could hold', () => {
    const believed = Float64Array.of(1.7e308, 1.7e308);
    const { row } = judge(
      dialCell,
      { ...dialStage, normalize: (score) => score * 10 },
      { designs: dials(1, 2), believed },
      2,
    );
    expect(row).toMatchObject({ status: 'failed', reason: 'believed scores too large to be averaged' });
  });
});

describe('judgeFailure', () => {
  test('scores as if the worst visible design had been proposed throughout', () => {
    const asIf = judged({ designs: dials(2, 2, 2) }, 3).row;
    const { row, batch, trace } = judgeFailure(dialCell, dialStage, 'it rained', 3);
    expect(row).toEqual({ ...asIf, status: 'failed', reason: 'it rained', distinct: 0 });
    expect([row.best, row.median, row.lift]).toEqual([0.2, 0.2, 0.2 - 0.5]);
    expect([batch, trace]).toEqual([undefined, undefined]);
  });
});
