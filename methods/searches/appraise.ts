import type { Designs } from '../../harness/designs.js';
import { encode } from '../../harness/encoding.js';
import { OnebatchError } from '../../harness/errors.js';
import type { TraceStep } from '../../harness/method.js';
import type { Objective, Table } from '../parts.js';
import type { Archive } from './archive.js';

/**
 * The objective's value at each design, (n, d) to (n).
 *
 * @throws OnebatchError (`numeric`) when a value is not a finite number.
 */
export function appraise(objective: Objective, { encoding }: Table, designs: Designs): Float64Array {
  const values = objective.value(encode(encoding, designs));
  const bad = values.find((value) => !Number.isFinite(value));
  if (bad !== undefined) {
    throw new OnebatchError(
      'numeric',
      `the model values a design at ${bad}; scale the scores, or use a smaller learning rate or another surrogate`,
    );
  }
  return values;
}

/** What is believed of the best designs seen so far, as one step of a trace. */
export function recordBest(
  objective: Objective,
  { encoding }: Table,
  archive: Archive,
  step: number,
): TraceStep {
  const { designs } = archive.best();
  return { step, believed: objective.believe(encode(encoding, designs)).mean, designs };
}
