import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { copyMatrix, type Matrix, zeros } from '../../../../harness/designs.js';
import { type Encoding, makeEncoding, projectInPlace } from '../../../../harness/encoding.js';
import { rootStream } from '../../../../harness/random.js';
import { sequenceSpace } from '../../../../harness/space.js';
import { ascentStep } from '../../../../methods/ascent-step.js';
import { kernelEnsemble } from '../../../../methods/surrogates/kernel/kernel-ensemble.js';
import { useBackend } from '../../../../methods/surrogates/network/backend.js';
import { freshParameters } from '../../../../methods/surrogates/network/parameters.js';
import { expectClose } from '../network/expect-close.js';
import { runs } from '../network/plain-network.js';
import { encoding as mixed, relaxedRows } from '../network/random-network.js';
import { kernelAscent } from './kernel-ascent.js';
import { keptParameters } from './kernel-passes.js';

beforeAll(() => useBackend('kernel'));

const scaling = { mean: 0, deviation: 1 };
const membersOf = (encoding: Encoding, count: number) =>
  Array.from({ length: count }, (_, m) =>
    keptParameters(freshParameters(encoding.width, [9, 5], rootStream(m))),
  );

/** Rows of any numbers, far outside the relaxed space as well. */
function wildRows(encoding: Encoding, rows: number, seed: number): Matrix {
  const stream = rootStream(seed);
  const x = zeros(rows, encoding.width);
  for (let k = 0; k < x.values.length; k++) x.values[k] = 3 * stream.normal();
  return x;
}

describe('an ascent in the kernel', () => {
  test.each([
    ['one network', 1, 0],
    ['the mean of three', 3, 0],
    ['the mean of three less twice their spread', 3, 2],
  ])('is ascentStep(…) along the gradient, step by step, for %s', (_, count, spreadWeight) => {
    const members = membersOf(mixed, count);
    const { gradient } = kernelEnsemble(mixed, members, scaling);
    const x = relaxedRows(7);
    const stepSize = 0.05;
    const { x: reached, trace } = kernelAscent(mixed, members, x, {
      steps: 5,
      stepSize,
      spreadWeight,
      traceEvery: 2,
    });
    const climbing = copyMatrix(x);
    const expected: Matrix[] = [];
    for (let step = 1; step <= 5; step++) {
      ascentStep(mixed, climbing, gradient!(climbing, spreadWeight), stepSize);
      if (step !== 1 && step !== 3) expected.push(copyMatrix(climbing));
    }
    expectClose(reached.values, climbing.values, 1e-12);
    expect(trace).toHaveLength(expected.length);
    trace.forEach((record, k) => {
      expectClose(record.values, expected[k]!.values, 1e-12, `record ${k}`);
    });
  });

  test('goes on over more rows than pass together', () => {
    const members = membersOf(mixed, 1);
    const climb = { steps: 3, stepSize: 0.1, spreadWeight: 0, traceEvery: 3 };
    const x = relaxedRows(300);
    const together = kernelAscent(mixed, members, x, climb);
    const last = { rows: 1, columns: x.columns, values: x.values.slice(-x.columns) };
    const alone = kernelAscent(mixed, members, last, climb);
    expect(together.x.values.slice(-x.columns)).toEqual(alone.x.values);
    expect(together.trace).toEqual([together.x]);
  });

  test('of no length projects rows as projectInPlace(encoding, x) does', () => {
    const spaces = [2, 3, 4, 20].map((levels) =>
      makeEncoding(
        sequenceSpace(
          3,
          Array.from({ length: levels }, (_, l) => `${l}`),
        ),
      ),
    );
    fc.assert(
      fc.property(fc.constantFrom(mixed, ...spaces), fc.nat(), (encoding, seed) => {
        const x = wildRows(encoding, 5, seed);
        const climb = { steps: 1, stepSize: 0, spreadWeight: 0, traceEvery: 0 };
        const projected = kernelAscent(encoding, membersOf(encoding, 1), x, climb);
        projectInPlace(encoding, x);
        expectClose(projected.x.values, x.values, 1e-14);
      }),
      runs,
    );
  });

  test('keeps what is not a number as such', () => {
    const x = relaxedRows(2);
    x.values[0] = Number.NaN;
    x.values[3] = Number.NaN;
    const climb = { steps: 1, stepSize: 0.1, spreadWeight: 0, traceEvery: 0 };
    const { x: reached } = kernelAscent(mixed, membersOf(mixed, 1), x, climb);
    expect(reached.values.subarray(0, x.columns).some(Number.isNaN)).toBe(true);
    expect(reached.values.subarray(x.columns).some(Number.isNaN)).toBe(false);
  });
});
