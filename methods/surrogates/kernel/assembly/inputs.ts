import { shape, work } from './networks';
import { eights, layerBytes, matrixBytes, panelBytes } from './shape';
import { factors, features, shifts } from './space';
import { activationsAt } from './workspace';

/** Scales encoded rows (f64, row-major) and puts them in the workspace, from row `first` of `rows` on. */
export function enterRows(x: usize, count: i32, rows: i32, first: i32): void {
  const inputs = activationsAt(shape, work, rows, 0);
  let from = x;
  for (let i = first; i < first + count; i++) {
    for (let j = 0; j < features; j++) {
      store<f32>(inputs + placeOf(i, j, rows), scaled(load<f64>(from), j));
      from += 8;
    }
  }
}

/** Scales encoded rows (f64, row-major) into rows of f32, each filled up to a multiple of eight with zeros. */
export function scaleRows(x: usize, count: i32, to: usize): void {
  const bytes = matrixBytes(1, features);
  memory.fill(to, 0, <usize>count * bytes);
  let from = x;
  for (let i: usize = 0; i < <usize>count; i++) {
    for (let j = 0; j < features; j++) {
      store<f32>(to + i * bytes + ((<usize>j) << 2), scaled(load<f64>(from), j));
      from += 8;
    }
  }
}

/** Puts the named rows of those that `scaleRows` wrote in the workspace, from its row 0 on. */
export function enterScaledRows(scaledRows: usize, order: usize, count: i32, rows: i32): void {
  const inputs = activationsAt(shape, work, rows, 0);
  const panels = eights(features) >> 3;
  for (let i = 0; i < count; i++) {
    let from = scaledRows + <usize>load<i32>(order + ((<usize>i) << 2)) * matrixBytes(1, features);
    let to = inputs + ((<usize>i) << 5);
    for (let p = 0; p < panels; p++) {
      v128.store(to, v128.load(from));
      v128.store(to, v128.load(from, 16), 16);
      from += 32;
      to += panelBytes(rows);
    }
  }
}

/** Makes room for `rows` rows of inputs, all zeros. */
export function clearInputs(rows: i32): void {
  memory.fill(activationsAt(shape, work, rows, 0), 0, layerBytes(rows, features));
}

/** Bytes from the start of a panel-wise matrix of `rows` rows to an entry. */
export function placeOf(row: i32, column: i32, rows: i32): usize {
  return <usize>(column >> 3) * panelBytes(rows) + ((<usize>row) << 5) + ((<usize>(column & 7)) << 2);
}

function scaled(feature: f64, j: i32): f32 {
  const at = (<usize>j) << 3;
  return <f32>((feature - load<f64>(shifts + at)) * load<f64>(factors + at));
}
