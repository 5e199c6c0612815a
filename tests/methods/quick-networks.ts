import { takeRows } from '../../harness/designs.js';
import type { Method, Offer } from '../../harness/method.js';
import { makeOffer, type OfferKind, toyTruth } from './contract.js';

/** Settings of a network that is trained in no time, for tests of what a method promises whatever it learned. */
export const quickNetwork = { width: 6, layers: 1, steps: 15, batch: 16 } as const;

/** The same for an ensemble. */
export const quickEnsemble = { ...quickNetwork, members: 2 } as const;

/** An offer of which only the half with the lower true scores is visible. */
export function makeLowerHalf(kind: OfferKind, seed: number, rows = 80): Offer {
  const whole = makeOffer(kind, { rows, seed });
  const truth = toyTruth(whole.space, whole.designs);
  const lower = [...truth.keys()].sort((a, b) => truth[a]! - truth[b]!).slice(0, rows / 2);
  return {
    ...whole,
    designs: takeRows(whole.designs, lower),
    scores: Float64Array.from(lower, (i) => whole.scores[i]!),
  };
}

/** Best true score of the method's batch minus that of the best visible design. */
export async function liftOf(method: Method, settings: object, offer: Offer): Promise<number> {
  const { designs } = await method.propose(offer, method.settings.parse(settings));
  const best = (of: Offer['designs']) => Math.max(...toyTruth(offer.space, of));
  return best(designs) - best(offer.designs);
}
