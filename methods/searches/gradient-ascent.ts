import { z } from 'zod';
import type { Matrix } from '../../harness/designs.js';
import { decode, encode, snap } from '../../harness/encoding.js';
import { OnebatchError } from '../../harness/errors.js';
import type { TraceStep } from '../../harness/method.js';
import { ascentStep } from '../ascent-step.js';
import { defineSearch, type Objective, type Table } from '../parts.js';
import { bestVisible, scoreScale } from '../table.js';

/** Climbs the model's gradient from the best visible designs. */
export const gradientAscent = defineSearch({
  name: 'gradient-ascent',
  description: 'projected gradient ascent from the best visible designs; categories climb a relaxed one-hot',
  source: 'gradient ascent: common practice; projection: Michelot 1986',
  settings: z.strictObject({
    steps: z.int().min(0).default(50).describe('ascent steps'),
    stepSize: z.number().positive().default(0.03).describe('size of a step in unit-cube units'),
    traceEvery: z.int().min(1).default(5).describe('steps between two records of the climb'),
  }),
  climb(objective, table, batchSize, { steps, stepSize, traceEvery }) {
    const { encoding } = table;
    const { deviation } = scoreScale(table.scores);
    const x = encode(encoding, bestVisible(table, batchSize));
    const trace: TraceStep[] = [record(objective, table, x, 0)];
    for (let step = 1; step <= steps; step++) {
      const gradient = gradientOf(objective, x);
      for (let i = 0; i < gradient.values.length; i++) gradient.values[i]! /= deviation;
      ascentStep(encoding, x, gradient, stepSize);
      if (step % traceEvery === 0 || step === steps) trace.push(record(objective, table, x, step));
    }
    return { designs: decode(encoding, x), trace };
  },
});

function gradientOf(objective: Objective, x: Matrix): Matrix {
  const gradient = objective.gradient?.(x);
  if (gradient === undefined) {
    throw new OnebatchError(
      'method-cannot',
      'search "gradient-ascent" needs a surrogate with a gradient; use a network, ridge or a Gaussian process',
    );
  }
  return gradient;
}

/** Belief is recorded at the designs the rows stand for, so that a relaxed category claims nothing by itself. */
function record(objective: Objective, { encoding }: Table, x: Matrix, step: number): TraceStep {
  return { step, believed: objective.believe(snap(encoding, x)).mean, designs: decode(encoding, x) };
}
