import type { z } from 'zod';
import type { Catalogue, ListedPart, MethodReference } from '../catalogue.js';
import { lookUpMethod } from '../catalogue.js';
import { type CurtainSpec, curtainLabel } from '../curtain.js';
import { suggestion } from '../nearest-word.js';
import type { MethodEntry, PlanFile, TaskEntry } from './file-schema.js';
import type { Plan, PlannedMethod, PlannedTask, Settings } from './plan.js';
import { check, type KeyPath, type Problem, show } from './problems.js';
import { expandSweep } from './sweep.js';
import { labelVariants } from './variant-label.js';

const partKeys = { surrogate: 'surrogates', search: 'searches', caution: 'cautions' } as const;

/** Looks up a plan file's words in the catalogue and fills in settings; collects every problem it meets. */
export function resolve(
  file: PlanFile,
  defaultName: string,
  catalogue: Catalogue,
): { plan: Plan; problems: readonly Problem[] } {
  const problems: Problem[] = [];
  const tasks = file.tasks.flatMap((entry, i) => {
    return resolveTask(entry, file.curtains, catalogue, ['tasks', i], problems) ?? [];
  });
  const entries = file.methods.map((entry, i) => resolveMethod(entry, catalogue, ['methods', i], problems));
  const methods = entries.flatMap((entry) => entry?.methods ?? []);
  problems.push(
    ...repeatedLabels(
      'tasks',
      tasks.map(({ label }) => [label]),
    ),
    ...repeatedLabels(
      'methods',
      entries.map((entry) => entry?.labels ?? []),
    ),
  );
  problems.push(...repeatedCurtains(file.curtains, ['curtains']));
  file.tasks.forEach(({ curtains = [] }, i) => {
    problems.push(...repeatedCurtains(curtains, ['tasks', i, 'curtains']));
  });
  const { name = defaultName, seed, methodSeed, seeds, pool, batch, budgetSeconds, backend, keep } = file;
  const seeded = methodSeed === undefined ? { seed } : { seed, methodSeed };
  const plan = { name, ...seeded, seeds, pool, batch, budgetSeconds, backend, keep, tasks, methods };
  if (file.methods.some(({ sweep }) => sweep !== undefined))
    return { plan: { ...plan, choose: file.choose ?? { on: 'seeds' } }, problems };
  if (file.choose !== undefined)
    problems.push({ path: ['choose'], message: 'there is nothing to choose, as no method has a sweep' });
  return { plan, problems };
}

function resolveTask(
  entry: TaskEntry,
  curtains: readonly CurtainSpec[],
  catalogue: Catalogue,
  at: KeyPath,
  problems: Problem[],
): PlannedTask | undefined {
  const family = find(catalogue.tasks, entry.task, 'task', [...at, 'task'], problems);
  if (family === undefined) return undefined;
  const settings = fill(family.settings, entry.settings, [...at, 'settings'], problems);
  return {
    label: entry.as ?? labelOf(family.name, entry.settings),
    family: family.name,
    settings,
    curtains: entry.curtains ?? curtains,
  };
}

/** What an entry of the list of methods comes to: one method, or a variant for each combination of its sweep. */
interface ResolvedMethod {
  /** Everything that tables may name it by. */
  readonly labels: readonly string[];
  readonly methods: readonly PlannedMethod[];
}

function resolveMethod(
  entry: MethodEntry,
  catalogue: Catalogue,
  at: KeyPath,
  problems: Problem[],
): ResolvedMethod | undefined {
  const reference = referenceOf(entry, catalogue, at, problems);
  if (reference === undefined) return undefined;
  const method = lookUpMethod(catalogue, reference);
  const label = entry.as ?? method.name;
  if (entry.sweep === undefined) {
    const settings = fill(method.settings, entry.settings, [...at, 'settings'], problems);
    return { labels: [label], methods: [{ label, method: reference, settings }] };
  }
  const { settings, sweep } = entry;
  const expanded = expandSweep({ settings, sweep }, method.settings, at);
  problems.push(...expanded.problems);
  const labels = labelVariants(
    label,
    expanded.variants.map(({ choice }) => choice),
  );
  return {
    labels: [label, ...labels],
    methods: expanded.variants.map((variant, i) => {
      return { label: labels[i]!, method: reference, settings: variant.settings, sweep: label };
    }),
  };
}

function referenceOf(
  entry: MethodEntry,
  catalogue: Catalogue,
  at: KeyPath,
  problems: Problem[],
): MethodReference | undefined {
  const { method, surrogate, search, caution } = entry;
  const parts = { surrogate, search, caution };
  const named = Object.entries(parts).filter(([, name]) => name !== undefined);
  if (method !== undefined) {
    if (named.length > 0) {
      problems.push({
        path: at,
        message: `names the method "${method}" and parts of its own; keep one of the two`,
      });
      return undefined;
    }
    return find(catalogue.methods, method, 'method', [...at, 'method'], problems)?.name;
  }
  if (surrogate === undefined || search === undefined) {
    problems.push({
      path: at,
      message: 'needs either "method", or "surrogate" and "search" (and "caution")',
    });
    return undefined;
  }
  const choice = { surrogate, search, caution: caution ?? 'none' };
  const known = Object.entries(partKeys).map(([kind, list]) => {
    const name = choice[kind as keyof typeof choice];
    return find(catalogue[list], name, kind, [...at, kind], problems);
  });
  return known.includes(undefined) ? undefined : choice;
}

function find<Part extends ListedPart>(
  parts: readonly Part[],
  name: string,
  kind: string,
  path: KeyPath,
  problems: Problem[],
): Part | undefined {
  const found = parts.find((part) => part.name === name);
  if (found === undefined) {
    const known = parts.map((part) => part.name);
    problems.push({ path, message: `no ${kind} is named ${show(name)}; ${suggestion(name, known)}` });
  }
  return found;
}

function fill(schema: z.ZodObject, given: Settings, path: KeyPath, problems: Problem[]): Settings {
  const checked = check(schema, given, path);
  problems.push(...checked.problems);
  return checked.value ?? {};
}

/** A task's name with the settings that the plan gives it, such as `ackley(dimensions=20)`. */
function labelOf(name: string, given: Settings): string {
  const words = Object.entries(given).map(([key, value]) => `${key}=${String(value)}`);
  return words.length === 0 ? name : `${name}(${words.join(',')})`;
}

/** @param entries the labels of each entry. */
function repeatedLabels(list: string, entries: readonly (readonly string[])[]): Problem[] {
  const seen = new Set<string>();
  return entries.flatMap((labels, i) => {
    const again = labels.find((label) => seen.has(label));
    for (const label of labels) seen.add(label);
    if (again === undefined) return [];
    return [
      {
        path: [list, i],
        message: `is the second one labelled "${again}"; give it a name of its own with "as"`,
      },
    ];
  });
}

function repeatedCurtains(curtains: readonly CurtainSpec[], at: KeyPath): Problem[] {
  const labels = curtains.map(curtainLabel);
  return labels.flatMap((label, i) =>
    labels.indexOf(label) === i
      ? []
      : [{ path: [...at, i], message: `is the second curtain "${label}"; keep one of the two` }],
  );
}
