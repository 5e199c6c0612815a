import type { MethodReference } from '../catalogue.js';
import type { CurtainSpec } from '../curtain.js';

/** Settings with all defaults filled in. */
export type Settings = Readonly<Record<string, unknown>>;

/** A task of a plan. */
export interface PlannedTask {
  /** How tables name it; unique in the plan. */
  readonly label: string;
  readonly family: string;
  readonly settings: Settings;
  /** The curtains this task is seen through. */
  readonly curtains: readonly CurtainSpec[];
}

/** A method of a plan. */
export interface PlannedMethod {
  /** How tables name it; unique in the plan. */
  readonly label: string;
  readonly method: MethodReference;
  readonly settings: Settings;
  /** The label that tables give to the one chosen of this method and its fellows; absent where it is no such variant. */
  readonly sweep?: string;
}

/** What is halved so that sweeps are chosen on one half and reported on the other. */
export type Halved = 'seeds' | 'tasks';

/** What `keep` can ask for. */
export type Kept = 'batches' | 'traces';

/** A plan whose every word is known and whose every default is filled in: plain data, fit for a manifest. */
export interface Plan {
  readonly name: string;
  /** Seeds every stream of the rehearsal. */
  readonly seed: number;
  /** Gives methods other random numbers on the same tasks and pools; absent where the plan doesn't name one. */
  readonly methodSeed?: number;
  /** Repeats: cells run with seeds 1 … seeds. */
  readonly seeds: number;
  /**
   * Numbers of seeds, ascending up to `seeds`, after which verdicts are looked at and the rehearsal ends if all are
   * reached; absent where it runs all seeds whatever they say.
   */
  readonly looks?: readonly number[];
  /** Designs in a pool. */
  readonly pool: number;
  /** Designs in a batch. */
  readonly batch: number;
  /** Seconds a method may take for a cell. */
  readonly budgetSeconds: number;
  /** What does the networks' arithmetic. */
  readonly backend: string;
  /** What goes to `cells/` beside the ledger. */
  readonly keep: readonly Kept[];
  readonly tasks: readonly PlannedTask[];
  readonly methods: readonly PlannedMethod[];
  /** How sweeps are chosen; absent where the plan has none. */
  readonly choose?: { readonly on: Halved };
}
