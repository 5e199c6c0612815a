import { blockCount, factorOf, featureCount, firstFeature, isCategory, shiftOf } from './space';

/*
 * Rows of a space with categories, as lists: one entry for each column that is no category, with its input, and one
 * for each level that is not zero, with the level times its factor. What the levels' shifts take off every row alike
 * is left to the biases. An entry is the byte offset of the feature's weights in a panel (i32) and a number (f32); a
 * row's head is the address of its list and its length (i32 both).
 */

export const entryBytes: usize = 8;

/** Entries in the lists of `count` encoded rows (f64, row-major, `rowBytes` each). */
export function countEntries(x: usize, count: i32, rowBytes: usize): i32 {
  let sum = 0;
  for (let i: usize = 0; i < <usize>count; i++) {
    const row = x + i * rowBytes;
    for (let b = 0; b < blockCount; b++) {
      if (!isCategory(b)) sum += 1;
      else sum += countLevels(row + ((<usize>firstFeature(b)) << 3), featureCount(b));
    }
  }
  return sum;
}

function countLevels(levels: usize, count: i32): i32 {
  let sum = 0;
  for (let l: usize = 0; l < <usize>count; l++) if (load<f64>(levels + (l << 3)) != 0) sum += 1;
  return sum;
}

/** Lists `count` rows from `lists` on and writes their heads. */
export function listRows(x: usize, count: i32, rowBytes: usize, heads: usize, lists: usize): void {
  let at = lists;
  for (let i: usize = 0; i < <usize>count; i++) {
    const end = listRow(x + i * rowBytes, at);
    store<i32>(heads + i * entryBytes, <i32>at);
    store<i32>(heads + i * entryBytes, <i32>((end - at) >> 3), 4);
    at = end;
  }
}

function listRow(row: usize, list: usize): usize {
  let at = list;
  for (let b = 0; b < blockCount; b++) {
    const first = firstFeature(b);
    if (!isCategory(b)) {
      const value = load<f64>(row + ((<usize>first) << 3));
      at = enter(at, first, (value - shiftOf(first)) * factorOf(first));
      continue;
    }
    const end = first + featureCount(b);
    for (let j = first; j < end; j++) {
      const level = load<f64>(row + ((<usize>j) << 3));
      if (level != 0) at = enter(at, j, level * factorOf(j));
    }
  }
  return at;
}

function enter(at: usize, feature: i32, value: f64): usize {
  store<i32>(at, feature << 5);
  store<f32>(at, <f32>value, 4);
  return at + entryBytes;
}
