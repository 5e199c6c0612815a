import { countEntries, entryBytes, listRows } from './lists';
import { heads, lists, shape, work } from './networks';
import { eights, layerBytes, matrixBytes, panelBytes } from './shape';
import { factorOf, factors, features, listing, shiftOf, shifts } from './space';
import { activationsAt } from './workspace';

/** Makes room for `rows` rows of inputs, all zeros. */
export function clearInputs(rows: i32): void {
  if (listing) memory.fill(heads, 0, <usize>rows * entryBytes);
  else memory.fill(activationsAt(shape, work, rows, 0), 0, layerBytes(rows, features));
}

/** Scales encoded rows (f64, row-major) and puts them in the workspace, from row `first` of `rows` on. */
export function enterRows(x: usize, count: i32, rows: i32, first: i32): void {
  if (listing) {
    listRows(x, count, (<usize>features) << 3, heads + <usize>first * entryBytes, lists);
    return;
  }
  let to = activationsAt(shape, work, rows, 0) + ((<usize>first) << 5);
  for (let i: usize = 0; i < <usize>count; i++) {
    scaleRow(x + ((i * <usize>features) << 3), to, panelBytes(rows));
    to += 32;
  }
}

/** Bytes that `prepareTable` needs for `count` encoded rows. */
export function tableBytes(x: usize, count: i32): f64 {
  if (!listing) return <f64>count * <f64>matrixBytes(1, features);
  return <f64>(count + countEntries(x, count, (<usize>features) << 3)) * <f64>entryBytes;
}

/** Scales encoded rows (f64, row-major) once, for `enterTableRows`. */
export function prepareTable(x: usize, count: i32, table: usize): void {
  if (listing) {
    listRows(x, count, (<usize>features) << 3, table, table + <usize>count * entryBytes);
    return;
  }
  const bytes = matrixBytes(1, features);
  memory.fill(table, 0, <usize>count * bytes);
  for (let i: usize = 0; i < <usize>count; i++)
    scaleRow(x + ((i * <usize>features) << 3), table + i * bytes, 32);
}

/** Puts the named rows of a prepared table in the workspace, from its row 0 on. */
export function enterTableRows(table: usize, order: usize, count: i32, rows: i32): void {
  const inputs = activationsAt(shape, work, rows, 0);
  const panels = eights(features) >> 3;
  for (let i: usize = 0; i < <usize>count; i++) {
    const row = <usize>load<i32>(order + (i << 2));
    if (listing) {
      store<i64>(heads + i * entryBytes, load<i64>(table + row * entryBytes));
      continue;
    }
    let from = table + row * matrixBytes(1, features);
    let to = inputs + (i << 5);
    for (let p = 0; p < panels; p++) {
      v128.store(to, v128.load(from));
      v128.store(to, v128.load(from, 16), 16);
      from += 32;
      to += panelBytes(rows);
    }
  }
}

/** Scales one row, writing eight inputs and the next eight `stride` bytes further on. */
function scaleRow(row: usize, to: usize, stride: usize): void {
  const whole = features & ~3;
  let at = to;
  for (let j = 0; j < whole; j += 4) {
    const offset = (<usize>j) << 3;
    const low = scaledPair(row + offset, offset);
    const high = scaledPair(row + offset + 16, offset + 16);
    v128.store(at, v128.shuffle<f32>(low, high, 0, 1, 4, 5));
    at += j & 4 ? stride - 16 : 16;
  }
  for (let j = whole; j < features; j++) {
    const feature = load<f64>(row + ((<usize>j) << 3));
    store<f32>(at, <f32>((feature - shiftOf(j)) * factorOf(j)));
    at += 4;
  }
}

function scaledPair(pair: usize, offset: usize): v128 {
  const moved = f64x2.sub(v128.load(pair), v128.load(shifts + offset));
  return f32x4.demote_f64x2_zero(f64x2.mul(moved, v128.load(factors + offset)));
}
