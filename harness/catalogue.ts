import type { Method } from './method.js';
import type { TaskFamily } from './task.js';

/** Which parts a plan's own method is made of. */
export interface PartsChoice {
  readonly surrogate: string;
  readonly search: string;
  readonly caution: string;
}

/** A part of a method as a listing shows it. */
export type ListedPart = Pick<Method, 'name' | 'description' | 'source' | 'settings'>;

/** The tasks and methods that plans can name, handed in from outside: the harness imports none. */
export interface Catalogue {
  readonly tasks: readonly TaskFamily[];
  readonly methods: readonly Method[];
  readonly surrogates: readonly ListedPart[];
  readonly searches: readonly ListedPart[];
  readonly cautions: readonly ListedPart[];
  /** The method made of three known parts. */
  compose(choice: PartsChoice): Method;
}

/** A method by its name, or made of three parts. */
export type MethodReference = string | PartsChoice;

/** The method that a resolved plan refers to. Throws RangeError for a name the catalogue does not hold. */
export function lookUpMethod(
  catalogue: Pick<Catalogue, 'methods' | 'compose'>,
  reference: MethodReference,
): Method {
  if (typeof reference !== 'string') return catalogue.compose(reference);
  const method = catalogue.methods.find(({ name }) => name === reference);
  if (method === undefined) throw new RangeError(`no method is named "${reference}"`);
  return method;
}

/** The task family of that name. Throws RangeError for a name the catalogue does not hold. */
export function lookUpTask(catalogue: Pick<Catalogue, 'tasks'>, name: string): TaskFamily {
  const family = catalogue.tasks.find((candidate) => candidate.name === name);
  if (family === undefined) throw new RangeError(`no task is named "${name}"`);
  return family;
}
