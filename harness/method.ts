import type { z } from 'zod';
import type { Designs } from './designs.js';
import type { Stream } from './random.js';
import type { Space } from './space.js';

/** Everything that a method sees of a cell: no task name, no truth, no hidden row. */
export interface Offer {
  readonly space: Space;
  /** The visible designs, (n, d). */
  readonly designs: Designs;
  /** Their measured, noisy scores, (n); larger is better. */
  readonly scores: Float64Array;
  /** How many designs to propose. */
  readonly batchSize: number;
  /** The method's own randomness; two runs with the same offer and settings give the same proposal. */
  readonly stream: Stream;
  /** Seconds after which the cell is ended and counts as failed. */
  readonly budgetSeconds: number;
}

/** Where a climb stood after `step` steps: what the method believed of its designs then. */
export interface TraceStep {
  readonly step: number;
  /** Predicted score of each design, (m). */
  readonly believed: Float64Array;
  /** The designs the climb held at this step, (m, d), inside the space. */
  readonly designs: Designs;
}

/** A method's one batch. */
export interface Proposal {
  /** Exactly `batchSize` designs inside the space. */
  readonly designs: Designs;
  /** What the method predicts for each design, in score units, (batchSize). */
  readonly believed?: Float64Array;
  /** How unsure it is of each prediction: one standard deviation, in score units, (batchSize). */
  readonly spread?: Float64Array;
  /** Belief along the climb, in order of steps. */
  readonly trace?: readonly TraceStep[];
}

/** A way to propose one batch from a table alone. */
export interface Method<Settings extends z.ZodObject = z.ZodObject> {
  /** The word by which plans and tables name it. */
  readonly name: string;
  /** One line for a listing. */
  readonly description: string;
  /** The published source, or "common practice". */
  readonly source: string;
  /** Settings with defaults and descriptions; strict, so that an unknown key is refused. */
  readonly settings: Settings;
  /**
   * Proposes a batch. Does not change the offer.
   *
   * @throws OnebatchError (`method-cannot`) when the method can't work on this space or table, saying exactly why.
   */
  propose(offer: Offer, settings: z.output<Settings>): Proposal | Promise<Proposal>;
}

/** Lets TypeScript infer a method's settings where it is written, and forgets them where methods are listed. */
export function defineMethod<Settings extends z.ZodObject>(method: Method<Settings>): Method<Settings> {
  return method;
}
