import type { Matrix } from '../../../harness/designs.js';
import { decode } from '../../../harness/encoding.js';
import type { Offer } from '../../../harness/method.js';
import type { Objective, Search, Table } from '../../../methods/parts.js';
import { makeTable } from '../../../methods/table.js';
import { describeMethodContract, toyTruth } from '../contract.js';

/** An objective that knows the toy truth, and counts the designs it was asked about. */
export function toyObjective(table: Table): Objective & { readonly asked: { rows: number; calls: number } } {
  const asked = { rows: 0, calls: 0 };
  const truth = (x: Matrix): Float64Array => toyTruth(table.encoding.space, decode(table.encoding, x));
  return {
    asked,
    value(x) {
      asked.rows += x.rows;
      asked.calls++;
      return truth(x);
    },
    believe: (x) => ({ mean: truth(x) }),
  };
}

/** Runs the method contract on a search that climbs the toy truth; `settings` are those that differ from the defaults. */
export function describeSearchContract(search: Search, settings: Record<string, unknown> = {}): void {
  const method = {
    ...search,
    async propose(offer: Offer, chosen: Record<string, unknown>) {
      const table = makeTable(offer);
      return search.climb(toyObjective(table), table, offer.batchSize, chosen, offer.stream);
    },
  };
  describeMethodContract(method, { settings });
}
