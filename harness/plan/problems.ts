import { z } from 'zod';
import { suggestion } from '../nearest-word.js';

/** A key's place in a plan: names and positions from the top. */
export type KeyPath = readonly (string | number)[];

/** One thing that is wrong with a plan. */
export interface Problem {
  readonly path: KeyPath;
  readonly message: string;
}

/** A key's place as people write it: `methods[2].settings.search.steps`; a key that is no plain word in quotes. */
export function writePath(path: KeyPath): string {
  return path.reduce<string>((text, key) => {
    if (typeof key === 'number') return `${text}[${key}]`;
    const word = /^[^\s"\p{C}]+$/u.test(key) ? key : JSON.stringify(key);
    return text === '' ? word : `${text}.${word}`;
  }, '');
}

/** Checks a value against a schema; problems are worded for people and carry the path of the key at fault. */
export function check<Schema extends z.ZodType>(
  schema: Schema,
  value: unknown,
  at: KeyPath = [],
): { value: z.output<Schema>; problems: [] } | { value: undefined; problems: Problem[] } {
  const result = schema.safeParse(value);
  if (result.success) return { value: result.data, problems: [] };
  return {
    value: undefined,
    problems: result.error.issues.flatMap((issue) => wordIssue(issue, schema, value, at)),
  };
}

function wordIssue(issue: z.core.$ZodIssue, schema: z.ZodType, value: unknown, at: KeyPath): Problem[] {
  const inner = issue.path.map((key) => (typeof key === 'number' ? key : String(key)));
  const path = [...at, ...inner];
  if (issue.code === 'unrecognized_keys') {
    const known = keysAt(schema, inner);
    return issue.keys.map((key) => ({
      path: [...path, key],
      message: `no such key; ${suggestion(key, known)}`,
    }));
  }
  const seen = valueAt(value, inner);
  return [{ path, message: wordOne(issue, seen) }];
}

function wordOne(issue: z.core.$ZodIssue, seen: unknown): string {
  if (seen === undefined) return 'is missing';
  const shown = `is ${show(seen)}`;
  switch (issue.code) {
    case 'too_small':
      if (issue.origin === 'array')
        return `needs at least ${issue.minimum} entr${issue.minimum === 1 ? 'y' : 'ies'}`;
      return `${shown}, must be ${issue.inclusive === false ? 'more than' : 'at least'} ${issue.minimum}`;
    case 'too_big':
      return `${shown}, must be ${issue.inclusive === false ? 'less than' : 'at most'} ${issue.maximum}`;
    case 'invalid_type':
      return `${shown}, must be ${nouns[issue.expected] ?? `of type ${issue.expected}`}`;
    case 'invalid_value': {
      const words = issue.values.map(String);
      return `${shown}, must be one of these; ${suggestion(String(seen), words)}`;
    }
    default:
      return `${shown}: ${issue.message}`;
  }
}

const nouns: Readonly<Record<string, string>> = {
  int: 'a whole number',
  number: 'a number',
  string: 'a word',
  boolean: 'true or false',
  array: 'a list',
  object: 'a group of keys',
  record: 'a group of keys',
};

/** A value as a message shows it, on one line and not too long. */
export function show(value: unknown): string {
  if (value === null) return 'empty';
  const text = typeof value === 'number' ? String(value) : (JSON.stringify(value) ?? String(value));
  return text.length > 40 ? `${text.slice(0, 37)}…` : text;
}

function valueAt(value: unknown, path: KeyPath): unknown {
  return path.reduce<unknown>(
    (inner, key) => (inner as Record<string | number, unknown> | undefined)?.[key],
    value,
  );
}

/** The keys that a schema knows at a path, through defaults, options, lists and alternatives. */
function keysAt(schema: z.ZodType, path: KeyPath): string[] {
  const here = unwrap(schema);
  if (here instanceof z.ZodUnion) {
    return here.options.flatMap((option) => keysAt(option as z.ZodType, path));
  }
  const [key, ...rest] = path;
  if (here instanceof z.ZodArray && key !== undefined) return keysAt(here.element as z.ZodType, rest);
  if (!(here instanceof z.ZodObject)) return [];
  if (key === undefined) return Object.keys(here.shape);
  const field = here.shape[key] as z.ZodType | undefined;
  return field === undefined ? [] : keysAt(field, rest);
}

function unwrap(schema: z.ZodType): z.ZodType {
  let current = schema;
  while (
    current instanceof z.ZodDefault ||
    current instanceof z.ZodPrefault ||
    current instanceof z.ZodOptional ||
    current instanceof z.ZodNullable
  ) {
    current = current.unwrap() as z.ZodType;
  }
  return current;
}
