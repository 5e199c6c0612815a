import type { CellRow } from '../../harness/row.js';
import type { Provenance } from '../manifest.js';

/** One of the two ledgers that a guard compares. */
export interface GuardSide {
  /** How messages name it: its folder, as typed. */
  readonly name: string;
  readonly provenance: Provenance;
  readonly rows: readonly CellRow[];
}
