import { type Stream, shuffleInPlace } from '../../../harness/random.js';
import type { NetworkSettings } from './network-settings.js';

/** Row numbers of each training step: the rows in a fresh random order each time they have all been used. */
export function* batchesOf(
  rows: number,
  { steps, batch }: Pick<NetworkSettings, 'steps' | 'batch'>,
  stream: Stream,
): Generator<number[]> {
  let order: number[] = [];
  for (let step = 0; step < steps; step++) {
    if (order.length === 0) {
      order = shuffleInPlace(
        Array.from({ length: rows }, (_, i) => i),
        stream,
      );
    }
    yield order.splice(0, batch);
  }
}
