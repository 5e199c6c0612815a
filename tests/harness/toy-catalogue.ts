import { z } from 'zod';
import type { Catalogue, ListedPart } from '../../harness/catalogue.js';
import { defineMethod, type Method } from '../../harness/method.js';
import { makeSpace } from '../../harness/space.js';
import { defineTaskFamily } from '../../harness/task.js';
import { toyTask } from './toy-task.js';

/** A sum over continuous columns whose weights differ by seed. */
export const slope = defineTaskFamily({
  name: 'slope',
  description: 'weighted sum of columns',
  source: 'none, made for tests',
  settings: z.strictObject({
    columns: z.int().min(1).max(50).default(3).describe('number of columns'),
    step: z.number().min(0).default(0).describe('scores are rounded down to multiples of it'),
    shape: z.enum(['plain', 'steep']).default('plain').describe('does nothing'),
  }),
  make({ columns, step }, stream) {
    const space = makeSpace(
      Array.from({ length: columns }, (_, i) => ({
        kind: 'continuous' as const,
        name: `x${i + 1}`,
        low: -1,
        high: 1,
      })),
    );
    return toyTask(space, stream, step);
  },
});

/** One column of each kind. */
export const blend = defineTaskFamily({
  name: 'blend',
  description: 'weighted sum over a dial, a count and a choice',
  source: 'none, made for tests',
  settings: z.strictObject({}),
  make: (_, stream) =>
    toyTask(
      makeSpace([
        { kind: 'continuous', name: 'dial', low: 0, high: 10 },
        { kind: 'integer', name: 'count', low: 1, high: 5 },
        { kind: 'category', name: 'kind', levels: ['a', 'b', 'c'] },
      ]),
      stream,
    ),
});

/** A method whose worker decides what it does, by its script. */
export const scripted = defineMethod({
  name: 'scripted',
  description: 'does what its script says',
  source: 'none, made for tests',
  settings: z.strictObject({
    script: z.string().default('good').describe('what to do'),
    search: z
      .strictObject({ steps: z.int().min(0).default(10).describe('steps') })
      .prefault({})
      .describe('how to climb'),
  }),
  propose: ({ designs }) => ({ designs }),
});

const idle = defineMethod({
  name: 'idle-best',
  description: 'nothing new',
  source: 'none, made for tests',
  settings: z.strictObject({}),
  propose: ({ designs }) => ({ designs }),
});

const part = (name: string): ListedPart => ({
  name,
  description: name,
  source: 'none, made for tests',
  settings: z.strictObject({}),
});

function composeToy(choice: { surrogate: string; search: string; caution: string }): Method {
  const settings = z.strictObject({
    surrogate: z.strictObject({ width: z.int().min(1).default(8).describe('units') }).prefault({}),
    search: z.strictObject({ steps: z.int().min(0).default(10).describe('steps') }).prefault({}),
    caution: z.strictObject({}).prefault({}),
  });
  return { ...idle, settings, name: Object.values(choice).join('+') };
}

/** A small catalogue for tests of the harness. */
export const toyCatalogue: Catalogue = {
  tasks: [slope, blend],
  methods: [scripted, idle],
  surrogates: [part('network'), part('network-ensemble'), part('ridge')],
  searches: [part('ascent'), part('genetic')],
  cautions: [part('none'), part('lower-bound')],
  compose: composeToy,
};
