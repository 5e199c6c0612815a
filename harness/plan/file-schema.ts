import { z } from 'zod';
import { curtainSchema } from '../curtain.js';

const label = z
  .string()
  .regex(
    /^[A-Za-z0-9][\w.+()=,-]{0,47}$/,
    'use letters, digits and . _ + - ( ) = , only, at most 48 characters',
  );

const taskEntry = z.strictObject({
  task: z.string(),
  as: label.optional(),
  settings: z.record(z.string(), z.unknown()).default({}),
  curtains: z.array(curtainSchema).min(1).optional(),
});

const methodEntry = z.strictObject({
  method: z.string().optional(),
  surrogate: z.string().optional(),
  search: z.string().optional(),
  caution: z.string().optional(),
  as: label.optional(),
  settings: z.record(z.string(), z.unknown()).default({}),
  sweep: z.record(z.string(), z.unknown()).optional(),
});

/** A plan file after short forms are spelt out; names and settings are checked against the catalogue afterwards. */
export const planFileSchema = z.strictObject({
  name: label.optional(),
  seed: z.int().min(0).default(1),
  methodSeed: z.int().min(0).optional(),
  seeds: z.int().min(1).max(100_000).default(16),
  pool: z.int().min(10).max(10_000_000).default(2000),
  batch: z.int().min(1).max(100_000).default(128),
  budgetSeconds: z.number().positive().max(1_000_000).default(300),
  backend: z.enum(['kernel', 'wasm', 'tfjs-node']).default('kernel'),
  keep: z.array(z.enum(['batches', 'traces'])).default([]),
  tasks: z.array(taskEntry).min(1),
  curtains: z.array(curtainSchema).min(1).default([{}]),
  methods: z.array(methodEntry).min(1),
  choose: z.strictObject({ on: z.enum(['seeds', 'tasks']).default('seeds') }).optional(),
});

export type PlanFile = z.output<typeof planFileSchema>;
export type TaskEntry = PlanFile['tasks'][number];
export type MethodEntry = PlanFile['methods'][number];

/** Spells out the short forms: an entry that is only a word names a task or a method. */
export function spellOut(raw: unknown): unknown {
  if (typeof raw !== 'object' || raw === null || Array.isArray(raw)) return raw;
  const plan: Record<string, unknown> = { ...raw };
  for (const [list, key] of [
    ['tasks', 'task'],
    ['methods', 'method'],
  ] as const) {
    const entries = plan[list];
    if (Array.isArray(entries)) {
      plan[list] = entries.map((entry: unknown) => (typeof entry === 'string' ? { [key]: entry } : entry));
    }
  }
  return plan;
}
