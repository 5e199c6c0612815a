import { z } from 'zod';

/** Settings of one network and its training. */
export const networkSettings = z.strictObject({
  width: z.int().min(1).max(4096).default(64).describe('units in each hidden layer'),
  layers: z.int().min(1).max(8).default(2).describe('hidden layers'),
  steps: z.int().min(1).default(300).describe('training steps'),
  batch: z.int().min(1).default(64).describe('rows in a training step'),
  learningRate: z.number().positive().default(0.002).describe('step size of Adam'),
  weightDecay: z.number().min(0).default(0).describe('decoupled weight decay'),
});

export type NetworkSettings = z.output<typeof networkSettings>;
