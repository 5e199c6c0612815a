import {
  type Designs,
  matrixFromRows,
  orderByDescending,
  rowKey,
  rowView,
} from '../../../harness/designs.js';
import { type Encoding, encode } from '../../../harness/encoding.js';
import type { Stream } from '../../../harness/random.js';
import { type Effort, type Improved, improveDesign } from './improve-design.js';
import type { GaussianPosterior } from './posterior.js';
import { drawFunctions } from './sample-functions.js';

const refined = 2;

/**
 * Thompson sampling (Thompson 1933): the designs that maximize `batchSize` functions drawn from the posterior, each
 * found from the candidates that are best under it. Designs repeat only where the candidates run out.
 */
export function thompsonBatch(
  posterior: GaussianPosterior,
  encoding: Encoding,
  candidates: Designs,
  batchSize: number,
  frequencies: number,
  effort: Effort,
  stream: Stream,
): Designs {
  const functions = drawFunctions(posterior, batchSize, frequencies, stream.split('draws'));
  const values = functions.values(encode(encoding, candidates));
  const batch = makeBatch(candidates);
  for (let k = 0; k < batchSize; k++) {
    const ofDraw = Float64Array.from(
      { length: candidates.rows },
      (_, i) => values.values[i * batchSize + k]!,
    );
    const order = orderByDescending(ofDraw);
    const target = {
      value: (x: Designs) => functions.value(k, x),
      gradient: (x: Designs) => functions.gradient(k, x),
    };
    const improved = order
      .slice(0, refined)
      .map((i, start) =>
        improveDesign(target, encoding, rowView(candidates, i), effort, stream.split('improve', k, start)),
      );
    batch.add(improved, order);
  }
  return batch.designs();
}

/**
 * Upper confidence bounds (Srinivas et al. 2010) one after another: the design with the largest mean + kappa · spread,
 * improved locally, is believed (Ginsbourger et al. 2010), and the next one is sought. Designs repeat only where the
 * candidates run out.
 *
 * @param posterior with room for `batchSize` designs; they are believed when this returns
 */
export function upperBoundBatch(
  posterior: GaussianPosterior,
  encoding: Encoding,
  candidates: Designs,
  batchSize: number,
  kappa: number,
  effort: Effort,
  stream: Stream,
): Designs {
  const tracked = posterior.track(encode(encoding, candidates));
  const target = {
    value: (x: Designs) => {
      const variance = posterior.variance(x);
      return posterior.mean(x).map((mean, i) => mean + kappa * Math.sqrt(variance[i]!));
    },
    gradient: (x: Designs) => posterior.gradient(x, -kappa),
  };
  const batch = makeBatch(candidates);
  for (let k = 0; k < batchSize; k++) {
    const bounds = tracked.mean.map((mean, i) => mean + kappa * Math.sqrt(tracked.variance[i]!));
    const order = orderByDescending(bounds);
    const improved = improveDesign(
      target,
      encoding,
      rowView(candidates, order[0]!),
      effort,
      stream.split('improve', k),
    );
    const chosen = batch.add([improved], order);
    posterior.believe(encode(encoding, matrixFromRows([chosen])).values, tracked);
  }
  return batch.designs();
}

/** A batch that takes the best improved design it does not hold yet, else the first such candidate, else a repeat. */
function makeBatch(candidates: Designs) {
  const taken = new Set<string>();
  const rows: Float64Array[] = [];
  return {
    add(improved: readonly Improved[], order: readonly number[]): Float64Array {
      const ranked = [...improved].sort((a, b) => b.value - a.value).map(({ design }) => design);
      const isNew = (row: Float64Array) => !taken.has(row.join(','));
      const candidate = () => order.find((i) => !taken.has(rowKey(candidates, i)));
      let chosen = ranked.find(isNew);
      if (chosen === undefined) {
        const at = candidate();
        chosen = at === undefined ? ranked[0]! : rowView(candidates, at).slice();
      }
      taken.add(chosen.join(','));
      rows.push(chosen);
      return chosen;
    },
    designs: () => matrixFromRows(rows, candidates.columns),
  };
}
