import fc from 'fast-check';
import { expect, test } from 'vitest';
import { stringify } from 'yaml';
import { OnebatchError } from '../../../harness/errors.js';
import { readPlan } from '../../../harness/plan/read.js';
import { toyCatalogue } from '../toy-catalogue.js';

type Value = null | boolean | number | string | Value[] | { [key: string]: Value };

const plan: Value = {
  name: 'p',
  seed: 3,
  seeds: 2,
  pool: 50,
  batch: 5,
  budgetSeconds: 2,
  backend: 'kernel',
  keep: ['batches'],
  tasks: [
    'slope',
    { task: 'blend', as: 'b', settings: {}, curtains: [{ ceiling: 0.5, thin: 9, noise: 0.1 }] },
  ],
  curtains: [{ family: { parents: 2, changes: 1 } }, { region: { columns: 1 } }],
  methods: [
    'scripted',
    { method: 'scripted', as: 's', settings: { search: { steps: 4 } } },
    { surrogate: 'ridge', search: 'genetic', caution: 'none', settings: { surrogate: { width: 3 } } },
    { method: 'scripted', as: 'w', sweep: { script: ['good', 'slow'], search: { steps: [1, 2] } } },
  ],
  choose: { on: 'tasks' },
};

const odd: fc.Arbitrary<Value> = fc.oneof(
  fc.constantFrom<Value>(
    null,
    true,
    -1,
    0,
    1.5,
    1e300,
    Number.NaN,
    Number.POSITIVE_INFINITY,
    '',
    'slope',
    [],
    {},
  ),
  fc.jsonValue({ maxDepth: 2 }) as fc.Arbitrary<Value>,
);
const oddKey = fc.oneof(
  fc.constantFrom('__proto__', 'constructor', 'toString', '', '0', 'task', 'settings', '<<'),
  fc.string({ maxLength: 6 }),
);

/** The value with one of its places, found by following `choices`, replaced, removed or given one more key. */
function broken(
  value: Value,
  choices: readonly number[],
  how: 'replace' | 'remove' | 'add',
  key: string,
  put: Value,
): Value {
  const copy: Value = structuredClone(value);
  let at: Value = copy;
  let last: { group: Record<string, Value>; key: string } | undefined;
  for (const choice of choices) {
    if (typeof at !== 'object' || at === null) break;
    const names: string[] = Object.keys(at);
    if (names.length === 0) break;
    last = { group: at as Record<string, Value>, key: names[choice % names.length]! };
    at = last.group[last.key]!;
  }
  if (how === 'add' && typeof at === 'object' && at !== null && !Array.isArray(at)) {
    Object.defineProperty(at, key, { value: put, enumerable: true, configurable: true, writable: true });
  } else if (last === undefined) return put;
  else if (how === 'remove') Reflect.deleteProperty(last.group, last.key);
  else last.group[last.key] = put;
  return copy;
}

/** Reads a text that may be a plan; anything but a plan or a complaint in words for people fails the test. */
function expectPlanOrComplaint(text: string): 'plan' | 'complaint' {
  try {
    const { tasks, methods } = readPlan(text, 'p.yaml', toyCatalogue);
    expect(tasks.length).toBeGreaterThan(0);
    expect(methods.length).toBeGreaterThan(0);
    return 'plan';
  } catch (error) {
    if (!(error instanceof OnebatchError)) throw error;
    expect(error.code).toBe('bad-plan');
    for (const line of error.message.split('\n')) expect(line).toMatch(/^p\.yaml(:\d+)?: \S/);
    return 'complaint';
  }
}

test('a plan broken in one place is read or refused in words for people', () => {
  const seen = { plan: 0, complaint: 0 };
  fc.assert(
    fc.property(
      fc.array(fc.nat(20), { maxLength: 6 }),
      fc.constantFrom('replace' as const, 'remove' as const, 'add' as const),
      oddKey,
      odd,
      (choices, how, key, put) => {
        seen[expectPlanOrComplaint(stringify(broken(plan, choices, how, key, put)))] += 1;
      },
    ),
    { numRuns: 500, seed: 11 },
  );
  expect(seen.complaint).toBeGreaterThan(100);
  expect(seen.plan).toBeGreaterThan(10);
});

test('a text that lost, gained or changed some characters is read or refused in words for people', () => {
  const text = stringify(plan);
  const edit = fc.record({
    at: fc.nat(text.length),
    cut: fc.nat(8),
    put: fc.oneof(
      fc.constantFrom('\t', '&a ', '*a', '- ', ': ', '{', ']', '"', '\n', '\0', '!!set ', '%', '|'),
      fc.string({ maxLength: 3 }),
    ),
  });
  fc.assert(
    fc.property(fc.array(edit, { minLength: 1, maxLength: 4 }), (edits) => {
      const edited = edits.reduce(
        (whole, { at, cut, put }) => whole.slice(0, at) + put + whole.slice(at + cut),
        text,
      );
      expectPlanOrComplaint(edited);
    }),
    { numRuns: 500, seed: 12 },
  );
});

test('any text at all is refused in words for people', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary', maxLength: 80 }), (text) => {
      expect(expectPlanOrComplaint(text)).toBe('complaint');
    }),
    { numRuns: 500, seed: 13 },
  );
});
