import type { z } from 'zod';
import type { Designs, Matrix } from '../harness/designs.js';
import type { Encoding } from '../harness/encoding.js';
import type { TraceStep } from '../harness/method.js';
import type { Stream } from '../harness/random.js';

/** The visible table as models see it. */
export interface Table {
  readonly encoding: Encoding;
  /** The visible designs, (n, d). */
  readonly designs: Designs;
  /** The same designs encoded, (n, width). */
  readonly x: Matrix;
  /** Measured scores, (n), in score units; larger is better. */
  readonly scores: Float64Array;
}

/** A prediction for each of n encoded rows, in score units. */
export interface Prediction {
  readonly mean: Float64Array;
  /** One standard deviation of what the model does not know; absent where the model has no idea of it. */
  readonly spread?: Float64Array;
}

/** What a surrogate learned from one table. */
export interface Model {
  /** Predicts encoded rows, (n, width), which need not be one-hot. Does not change its argument. */
  predict(x: Matrix): Prediction;
  /**
   * Gradient of mean − spreadWeight · spread with respect to the encoded rows, (n, width). Absent where the model has
   * none. With `spreadWeight` 0 it is the gradient of the mean.
   */
  gradient?(x: Matrix, spreadWeight: number): Matrix;
}

/** How hard, and against what, a conservative training pushes predictions down. */
export interface Conservatism {
  /** Rows of each training step from which designs are mined. */
  readonly rows: number;
  /** Ascent steps that mine the designs pushed down. */
  readonly steps: number;
  /** Size of one such step, as for the search `gradient-ascent`. */
  readonly stepSize: number;
  /** Weight of the penalty; the starting weight when a target is set. */
  readonly weight: number;
  /** Over-estimation to hold the weight at, in standard deviations of the table's scores; absent: fixed weight. */
  readonly target?: number;
}

interface Part<Settings extends z.ZodObject> {
  readonly name: string;
  readonly description: string;
  readonly source: string;
  /** Strict, with defaults and descriptions. */
  readonly settings: Settings;
}

/** What is learned from the table. */
export interface Surrogate<Settings extends z.ZodObject = z.ZodObject> extends Part<Settings> {
  fit(table: Table, settings: z.output<Settings>, stream: Stream): Model | Promise<Model>;
  /** Fits while holding predictions down at designs that an ascent of the model finds; absent where it can't. */
  fitConservatively?(
    table: Table,
    settings: z.output<Settings>,
    conservatism: Conservatism,
    stream: Stream,
  ): Model | Promise<Model>;
}

/** What a search climbs. */
export interface Objective {
  /** The value to maximize at encoded rows, (n). */
  value(x: Matrix): Float64Array;
  /** Its gradient, (n, width); absent where the model has none. */
  gradient?(x: Matrix): Matrix;
  /** What the model honestly predicts there, whatever the caution takes off. */
  believe(x: Matrix): Prediction;
}

/** What keeps a climb from running into the model's mistakes. */
export interface Caution<Settings extends z.ZodObject = z.ZodObject> extends Part<Settings> {
  /**
   * Fits the surrogate to the table and says what the search should climb.
   *
   * @throws OnebatchError (`method-cannot`) when the surrogate lacks what the caution needs.
   */
  prepare(
    surrogate: Surrogate,
    surrogateSettings: Record<string, unknown>,
    table: Table,
    settings: z.output<Settings>,
    stream: Stream,
  ): Promise<Objective>;
}

/** Where a search ended: the batch, and how it got there. */
export interface Climb {
  readonly designs: Designs;
  readonly trace?: readonly TraceStep[];
}

/** How an objective is climbed. */
export interface Search<Settings extends z.ZodObject = z.ZodObject> extends Part<Settings> {
  climb(
    objective: Objective,
    table: Table,
    batchSize: number,
    settings: z.output<Settings>,
    stream: Stream,
  ): Climb | Promise<Climb>;
}

/** Lets TypeScript infer a surrogate's settings. */
export function defineSurrogate<S extends z.ZodObject>(surrogate: Surrogate<S>): Surrogate<S> {
  return surrogate;
}

/** Lets TypeScript infer a search's settings. */
export function defineSearch<S extends z.ZodObject>(search: Search<S>): Search<S> {
  return search;
}

/** Lets TypeScript infer a caution's settings. */
export function defineCaution<S extends z.ZodObject>(caution: Caution<S>): Caution<S> {
  return caution;
}
