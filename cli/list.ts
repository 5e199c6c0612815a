import { z } from 'zod';
import type { ListedPart } from '../harness/catalogue.js';
import { OnebatchError } from '../harness/errors.js';
import { suggestion } from '../harness/nearest-word.js';
import { catalogue } from './catalogue.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { type SectionName, sectionNames } from './section-names.js';
import { say } from './terminal.js';

const sections = {
  tasks: { title: 'Tasks (larger scores are better)', parts: catalogue.tasks },
  methods: { title: 'Methods', parts: catalogue.methods },
  surrogates: { title: 'Surrogates, for methods of your own', parts: catalogue.surrogates },
  searches: { title: 'Searches, for methods of your own', parts: catalogue.searches },
  cautions: { title: 'Cautions, for methods of your own', parts: catalogue.cautions },
} as const satisfies Record<SectionName, unknown>;

/**
 * Shows what plans can name: each task, method and part with its source, its settings and their defaults.
 *
 * @throws OnebatchError (`bad-input`) for a section that there is not.
 */
export function list(only: string | undefined): ExitCode {
  const chosen = only === undefined ? sectionNames : sectionNames.filter((name) => name === only);
  if (only !== undefined && chosen.length === 0) {
    throw new OnebatchError('bad-input', `no section is named "${only}"; ${suggestion(only, sectionNames)}`);
  }
  say(chosen.map((name) => describeSection(name)).join('\n'));
  return exitCodes.done;
}

function describeSection(name: SectionName): string {
  const { title, parts } = sections[name];
  return [title, '', ...parts.flatMap(describePart)].join('\n');
}

function describePart({ name, description, source, settings }: ListedPart): string[] {
  const lines = describeSettings(settings).map(({ key, standard, meaning }) => {
    return `      ${key} = ${standard}${meaning === '' ? '' : `  (${meaning})`}`;
  });
  return [`  ${name}`, `      ${description}`, `      source: ${source}`, ...lines, ''];
}

interface ListedSetting {
  readonly key: string;
  readonly standard: string;
  readonly meaning: string;
}

/** A schema's settings, those of inner groups as `group.key`. */
export function describeSettings(schema: z.ZodObject, prefix = ''): ListedSetting[] {
  const defaults = schema.parse({}) as Record<string, unknown>;
  return Object.entries(schema.shape).flatMap(([key, field]) => {
    const inner = innerObject(field as z.ZodType);
    if (inner !== undefined) return describeSettings(inner, `${prefix}${key}.`);
    const meaning = (field as z.ZodType).description ?? '';
    return [{ key: `${prefix}${key}`, standard: JSON.stringify(defaults[key]) ?? 'none', meaning }];
  });
}

function innerObject(field: z.ZodType): z.ZodObject | undefined {
  const unwrapped = field instanceof z.ZodPrefault || field instanceof z.ZodDefault ? field.unwrap() : field;
  return unwrapped instanceof z.ZodObject ? unwrapped : undefined;
}
