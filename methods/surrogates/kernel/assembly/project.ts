import { blockCount, featureCount, features, firstFeature, isCategory } from './space';

/**
 * Moves encoded rows (f64) to the nearest point of the relaxed space, in place: scaled columns into [0, 1], the
 * features of a category onto the probability simplex (Michelot 1986).
 */
export function project(x: usize, count: i32): void {
  for (let i = 0; i < count; i++) {
    const row = x + ((<usize>i * <usize>features) << 3);
    for (let b = 0; b < blockCount; b++) {
      const at = row + ((<usize>firstFeature(b)) << 3);
      if (isCategory(b)) projectOntoSimplex(at, at + ((<usize>featureCount(b)) << 3));
      else store<f64>(at, min<f64>(1, max<f64>(0, load<f64>(at))));
    }
  }
}

function projectOntoSimplex(start: usize, end: usize): void {
  // Taking the largest feature off all of them leaves the projection as it is, and huge features exact.
  let largest = -Infinity;
  for (let at = start; at < end; at += 8) largest = max<f64>(largest, load<f64>(at));
  for (let at = start; at < end; at += 8) store<f64>(at, load<f64>(at) - largest);
  let threshold = -Infinity;
  let active = i32.MAX_VALUE;
  for (;;) {
    let sum: f64 = 0;
    let above = 0;
    for (let at = start; at < end; at += 8) {
      const feature = load<f64>(at);
      if (feature > threshold) {
        sum += feature;
        above += 1;
      }
    }
    if (above >= active || above == 0) break; // exactly equal, but for rounding
    active = above;
    threshold = (sum - 1) / <f64>above;
  }
  for (let at = start; at < end; at += 8) store<f64>(at, max<f64>(0, load<f64>(at) - threshold));
}
