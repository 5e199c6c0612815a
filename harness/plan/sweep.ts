import type { z } from 'zod';
import { canonicalJson } from '../canonical.js';
import type { Settings } from './plan.js';
import { check, type KeyPath, type Problem, show } from './problems.js';
import type { ChosenValue } from './variant-label.js';

/** A sweep that makes more variants than this is refused. */
const mostVariants = 200;

/** A setting of a sweep, and the values it is to take. */
interface SweptSetting {
  readonly path: readonly string[];
  readonly values: readonly unknown[];
}

/** One of the combinations of a sweep. */
export interface Variant {
  readonly choice: readonly ChosenValue[];
  /** All settings, defaults filled in. */
  readonly settings: Settings;
}

/** A method entry's settings: one value each, and those that take several. */
export interface SweptEntry {
  readonly settings: Settings;
  readonly sweep: Settings;
}

/**
 * All combinations of a sweep's values over a method's other settings, each checked by the method's schema; the last
 * setting changes fastest. Problems are told with their place in the plan.
 *
 * @param at the method entry's place.
 */
export function expandSweep(
  { settings, sweep }: SweptEntry,
  schema: z.ZodObject,
  at: KeyPath,
): { variants: readonly Variant[]; problems: readonly Problem[] } {
  const found: Problem[] = [];
  const swept = listSettings(sweep, settings, [...at, 'sweep'], [], found);
  const count = swept.reduce((product, { values }) => product * values.length, 1);
  if (count > mostVariants) {
    const message = `makes ${count} combinations, at most ${mostVariants} are allowed; give fewer settings or values`;
    found.push({ path: [...at, 'sweep'], message });
  }
  if (found.length > 0) return { variants: [], problems: found };
  const problems = new Map<string, Problem>();
  const variants = combine(swept).map((places) => {
    const choice = swept.map(({ path, values }, i) => ({ path, value: values[places[i]!] }));
    const given = choice.reduce((all, { path, value }) => withValue(all, path, value), settings);
    const checked = check(schema, given);
    for (const { path, message } of checked.problems) {
      const id = JSON.stringify([path, message]);
      const place = [...at, ...placeOf(path, settings, swept, places)];
      const before = problems.get(id)?.path ?? place;
      problems.set(id, { path: commonPath(before, place), message });
    }
    return { choice, settings: checked.value ?? {} };
  });
  return { variants, problems: [...problems.values()] };
}

/** The lists at the ends of a sweep's branches, in the order in which they are written. */
function listSettings(
  sweep: Settings,
  given: Settings,
  at: KeyPath,
  path: readonly string[],
  problems: Problem[],
): SweptSetting[] {
  const entries = Object.entries(sweep);
  const refuse = (place: KeyPath, message: string): [] => {
    problems.push({ path: place, message });
    return [];
  };
  if (entries.length === 0) return refuse(at, 'names no setting; give one a list of values');
  return entries.flatMap(([key, inner]) => {
    const [here, inside] = [
      [...at, key],
      [...path, key],
    ];
    if (isGroup(inner)) return listSettings(inner, given, here, inside, problems);
    if (!Array.isArray(inner) || inner.length < 2)
      return refuse(here, `is ${show(inner)}, must be a list of at least two different values`);
    const texts = inner.map(canonicalJson);
    const again = texts.findIndex((text, i) => texts.indexOf(text) !== i);
    if (again >= 0) return refuse([...here, again], `is ${show(inner[again])} a second time; keep one`);
    if (standsIn(given, inside)) return refuse(here, 'stands in settings too; keep one of the two');
    return [{ path: inside, values: inner as unknown[] }];
  });
}

/** Places in the lists of values, one for each setting, for every combination. */
function combine(swept: readonly SweptSetting[]): number[][] {
  return swept.reduce<number[][]>(
    (rows, { values }) => rows.flatMap((row) => values.map((_, i) => [...row, i])),
    [[]],
  );
}

function withValue(group: Settings, [key, ...rest]: readonly string[], value: unknown): Settings {
  const inner = Object.hasOwn(group, key!) ? group[key!] : undefined;
  return { ...group, [key!]: rest.length === 0 ? value : withValue((inner ?? {}) as Settings, rest, value) };
}

/** Whether settings hold a value at the path, or something on the way to it that is no group of keys. */
function standsIn(settings: Settings, path: readonly string[]): boolean {
  let current: unknown = settings;
  for (const key of path) {
    if (!isGroup(current)) return true;
    if (!Object.hasOwn(current, key)) return false;
    current = current[key];
  }
  return true;
}

/** Where in the method's entry a setting at fault was written. */
function placeOf(
  path: KeyPath,
  given: Settings,
  swept: readonly SweptSetting[],
  places: readonly number[],
): KeyPath {
  const within = swept.findIndex((setting) => setting.path.every((key, i) => key === path[i]));
  if (within >= 0) {
    const setting = swept[within]!;
    return ['sweep', ...setting.path, places[within]!, ...path.slice(setting.path.length)];
  }
  const above = swept.some((setting) => path.every((key, i) => key === setting.path[i]));
  return [above && !standsIn(given, path.map(String)) ? 'sweep' : 'settings', ...path];
}

/** What is wrong with several values of a setting in the same way is wrong with the setting. */
function commonPath(a: KeyPath, b: KeyPath): KeyPath {
  const parting = a.findIndex((key, i) => key !== b[i]);
  return parting < 0 ? a : a.slice(0, parting);
}

function isGroup(value: unknown): value is Settings {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
