import type { z } from 'zod';
import type { Designs } from './designs.js';
import type { Stream } from './random.js';
import type { Space } from './space.js';

/**
 * How a task's best value is known: `published` in the literature, `exact` because it was computed with a guarantee,
 * or only `best-known`, in which case a true score can lie above it.
 */
export type OptimumKnowledge = 'published' | 'exact' | 'best-known';

/** The largest true score of a task. */
export interface Optimum {
  readonly value: number;
  /** One design that reaches it, a value a column; absent where only the value is known. */
  readonly design?: Float64Array;
  readonly known: OptimumKnowledge;
}

/** One problem with a known truth. Larger scores are always better. */
export interface Task {
  readonly space: Space;
  /** The true score of each design, (n, d) to (n), without noise. Deterministic; does not change its argument. */
  truth(designs: Designs): Float64Array;
  readonly optimum: Optimum;
}

/** A family of tasks: its settings and a seeded stream give one instance. */
export interface TaskFamily<Settings extends z.ZodObject = z.ZodObject> {
  /** The word by which plans name it: lower-case words joined by hyphens. */
  readonly name: string;
  /** One line for a listing. */
  readonly description: string;
  /** The published source, as "Author year", or what it is where there is none. */
  readonly source: string;
  /** Settings with defaults and descriptions; strict, so that an unknown key is refused. */
  readonly settings: Settings;
  /**
   * Makes an instance. Instances differ by stream, and carry their optimum along exactly.
   *
   * @throws OnebatchError (`bad-settings`) when the settings contradict each other.
   */
  make(settings: z.output<Settings>, stream: Stream): Task;
}

/** Lets TypeScript infer a family's settings where it is written, and forgets them where families are listed. */
export function defineTaskFamily<Settings extends z.ZodObject>(
  family: TaskFamily<Settings>,
): TaskFamily<Settings> {
  return family;
}
