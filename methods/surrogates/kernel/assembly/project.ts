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
      else store<f64>(at, cut(load<f64>(at)));
    }
  }
}

/** Into [0, 1]; what is not a number stays so. */
function cut(feature: f64): f64 {
  if (feature < 0) return 0;
  return feature > 1 ? 1 : feature;
}

/**
 * Features from `start` to `end`, two at a time; an odd one at the end stands beside minus infinity, which takes part in
 * nothing. Taking the largest feature off all of them leaves the projection as it is, and huge features exact.
 */
function projectOntoSimplex(start: usize, end: usize): void {
  let top = f64x2.splat(-Infinity);
  for (let at = start; at < end; at += 16) top = f64x2.pmax(top, pair(at, end));
  const first = f64x2.extract_lane(top, 0);
  const second = f64x2.extract_lane(top, 1);
  const largest = first > second ? first : second;
  const offsets = f64x2.splat(largest);
  for (let at = start; at < end; at += 16) storePair(at, end, f64x2.sub(pair(at, end), offsets));
  let threshold = -Infinity;
  let active = i64.MAX_VALUE;
  for (;;) {
    const thresholds = f64x2.splat(threshold);
    let sums = f64x2.splat(0);
    let counts = i64x2.splat(0);
    for (let at = start; at < end; at += 16) {
      const features = pair(at, end);
      const above = f64x2.gt(features, thresholds);
      sums = f64x2.add(sums, v128.and(features, above));
      counts = i64x2.sub(counts, above);
    }
    const count = i64x2.extract_lane(counts, 0) + i64x2.extract_lane(counts, 1);
    if (count >= active || count == 0) break; // exactly equal, but for rounding
    active = count;
    threshold = (f64x2.extract_lane(sums, 0) + f64x2.extract_lane(sums, 1) - 1) / <f64>count;
  }
  const thresholds = f64x2.splat(threshold);
  const zeros = f64x2.splat(0);
  for (let at = start; at < end; at += 16) {
    storePair(at, end, f64x2.pmax(f64x2.sub(pair(at, end), thresholds), zeros));
  }
}

function pair(at: usize, end: usize): v128 {
  return at + 16 <= end ? v128.load(at) : f64x2.replace_lane(f64x2.splat(-Infinity), 0, load<f64>(at));
}

function storePair(at: usize, end: usize, features: v128): void {
  if (at + 16 <= end) v128.store(at, features);
  else store<f64>(at, f64x2.extract_lane(features, 0));
}
