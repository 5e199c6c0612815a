import { fours, panelBytes } from './shape';
import { transposeTile } from './transpose';

/** What follows a product: biases and leaky units, the units' derivative, or nothing. */
export const asUnits: i32 = 0;
export const throughUnits: i32 = 1;
export const asIs: i32 = 2;

/**
 * C = A · B for panel-wise matrices, eight columns of C at a time, tiles of 4 × 8 sums in registers.
 *
 * A has `rows` rows (a multiple of four) and `inner` columns, B `innerRows` rows (a multiple of eight, of which
 * `inner` are used), C as many rows as A and `panels` panels. With `asUnits`, `extra` holds B's biases and C becomes
 * the activations of leaky units; with `throughUnits`, `extra` holds activations, by whose slope C is multiplied.
 * `tile` has room for four rows of A.
 */
export function multiply(
  a: usize,
  b: usize,
  c: usize,
  rows: i32,
  inner: i32,
  innerRows: i32,
  panels: i32,
  after: i32,
  extra: usize,
  slope: f32,
  tile: usize,
): void {
  const stride = panelBytes(rows);
  const slopes = f32x4.splat(slope);
  const steps = fours(inner);
  const end = tile + ((<usize>steps) << 4);
  for (let i = 0; i < rows; i += 4) {
    packTile(a + ((<usize>i) << 5), stride, steps, tile);
    for (let p = 0; p < panels; p++) {
      let c00 = v128.splat<f32>(0);
      let c01 = c00;
      if (after == asUnits) {
        c00 = v128.load(extra + ((<usize>p) << 5));
        c01 = v128.load(extra + ((<usize>p) << 5), 16);
      }
      let c10 = c00;
      let c11 = c01;
      let c20 = c00;
      let c21 = c01;
      let c30 = c00;
      let c31 = c01;
      let at = tile;
      let by = b + <usize>p * ((<usize>innerRows) << 5);
      do {
        const b0 = v128.load(by);
        const b1 = v128.load(by, 16);
        const a0 = v128.load_splat<f32>(at);
        c00 = f32x4.add(c00, f32x4.mul(a0, b0));
        c01 = f32x4.add(c01, f32x4.mul(a0, b1));
        const a1 = v128.load_splat<f32>(at, 4);
        c10 = f32x4.add(c10, f32x4.mul(a1, b0));
        c11 = f32x4.add(c11, f32x4.mul(a1, b1));
        const a2 = v128.load_splat<f32>(at, 8);
        c20 = f32x4.add(c20, f32x4.mul(a2, b0));
        c21 = f32x4.add(c21, f32x4.mul(a2, b1));
        const a3 = v128.load_splat<f32>(at, 12);
        c30 = f32x4.add(c30, f32x4.mul(a3, b0));
        c31 = f32x4.add(c31, f32x4.mul(a3, b1));
        by += 32;
        at += 16;
      } while (at < end);
      const to = c + <usize>p * stride + ((<usize>i) << 5);
      if (after == asUnits) {
        v128.store(to, leaky(c00, slopes));
        v128.store(to, leaky(c01, slopes), 16);
        v128.store(to, leaky(c10, slopes), 32);
        v128.store(to, leaky(c11, slopes), 48);
        v128.store(to, leaky(c20, slopes), 64);
        v128.store(to, leaky(c21, slopes), 80);
        v128.store(to, leaky(c30, slopes), 96);
        v128.store(to, leaky(c31, slopes), 112);
      } else if (after == throughUnits) {
        const units = extra + <usize>p * stride + ((<usize>i) << 5);
        v128.store(to, through(c00, v128.load(units), slopes));
        v128.store(to, through(c01, v128.load(units, 16), slopes), 16);
        v128.store(to, through(c10, v128.load(units, 32), slopes), 32);
        v128.store(to, through(c11, v128.load(units, 48), slopes), 48);
        v128.store(to, through(c20, v128.load(units, 64), slopes), 64);
        v128.store(to, through(c21, v128.load(units, 80), slopes), 80);
        v128.store(to, through(c30, v128.load(units, 96), slopes), 96);
        v128.store(to, through(c31, v128.load(units, 112), slopes), 112);
      } else {
        v128.store(to, c00);
        v128.store(to, c01, 16);
        v128.store(to, c10, 32);
        v128.store(to, c11, 48);
        v128.store(to, c20, 64);
        v128.store(to, c21, 80);
        v128.store(to, c30, 96);
        v128.store(to, c31, 112);
      }
    }
  }
}

/** Puts four rows of A together, column by column, so that a product reads them in one stream. */
function packTile(from: usize, stride: usize, columns: i32, tile: usize): void {
  for (let k = 0; k < columns; k += 4) {
    transposeTile(from + <usize>(k >> 3) * stride + ((<usize>(k & 4)) << 2), tile + ((<usize>k) << 4), 16);
  }
}

/**
 * C = Aᵀ · B over the first `count` of `rows` rows: the gradient of weights from activations A (`inputs` columns) and
 * derivatives B (`panels` panels). C has `eights(inputs)` rows, of which `fours(inputs)` are written. `tile` has room
 * for four columns of A; `count` is at least 1.
 */
export function multiplyTransposed(
  a: usize,
  b: usize,
  c: usize,
  rows: i32,
  count: i32,
  inputs: i32,
  outRows: i32,
  panels: i32,
  tile: usize,
): void {
  const stride = panelBytes(rows);
  const end = fours(inputs);
  const bottom = tile + ((<usize>count) << 4);
  for (let i = 0; i < end; i += 4) {
    packColumns(a + <usize>(i >> 3) * stride + ((<usize>(i & 4)) << 2), count, tile);
    for (let p = 0; p < panels; p++) {
      let at = tile;
      let by = b + <usize>p * stride;
      let c00 = v128.splat<f32>(0);
      let c01 = c00;
      let c10 = c00;
      let c11 = c00;
      let c20 = c00;
      let c21 = c00;
      let c30 = c00;
      let c31 = c00;
      do {
        const b0 = v128.load(by);
        const b1 = v128.load(by, 16);
        const a0 = v128.load_splat<f32>(at);
        c00 = f32x4.add(c00, f32x4.mul(a0, b0));
        c01 = f32x4.add(c01, f32x4.mul(a0, b1));
        const a1 = v128.load_splat<f32>(at, 4);
        c10 = f32x4.add(c10, f32x4.mul(a1, b0));
        c11 = f32x4.add(c11, f32x4.mul(a1, b1));
        const a2 = v128.load_splat<f32>(at, 8);
        c20 = f32x4.add(c20, f32x4.mul(a2, b0));
        c21 = f32x4.add(c21, f32x4.mul(a2, b1));
        const a3 = v128.load_splat<f32>(at, 12);
        c30 = f32x4.add(c30, f32x4.mul(a3, b0));
        c31 = f32x4.add(c31, f32x4.mul(a3, b1));
        at += 16;
        by += 32;
      } while (at < bottom);
      const to = c + <usize>p * ((<usize>outRows) << 5) + ((<usize>i) << 5);
      v128.store(to, c00);
      v128.store(to, c01, 16);
      v128.store(to, c10, 32);
      v128.store(to, c11, 48);
      v128.store(to, c20, 64);
      v128.store(to, c21, 80);
      v128.store(to, c30, 96);
      v128.store(to, c31, 112);
    }
  }
}

/** Puts four columns of A together, row by row. */
function packColumns(from: usize, count: i32, tile: usize): void {
  for (let k: usize = 0; k < <usize>count; k++) v128.store(tile + (k << 4), v128.load(from + (k << 5)));
}

/** Sums of the columns of a panel-wise matrix over its first `count` rows: the gradient of biases. */
export function sumRows(b: usize, c: usize, rows: i32, count: i32, panels: i32): void {
  for (let p = 0; p < panels; p++) {
    let at = b + <usize>p * panelBytes(rows);
    let left = v128.splat<f32>(0);
    let right = left;
    for (let k = 0; k < count; k++) {
      left = f32x4.add(left, v128.load(at));
      right = f32x4.add(right, v128.load(at, 16));
      at += 32;
    }
    v128.store(c + ((<usize>p) << 5), left);
    v128.store(c + ((<usize>p) << 5), right, 16);
  }
}

/** Leaky rectified units: z above zero, slope · z below, for a slope of at most 1. */
export function leaky(z: v128, slopes: v128): v128 {
  return f32x4.pmax(z, f32x4.mul(z, slopes));
}

/** A derivative taken back through units with the given activations. */
export function through(derivative: v128, activation: v128, slopes: v128): v128 {
  const above = f32x4.gt(activation, v128.splat<f32>(0));
  return v128.bitselect(derivative, f32x4.mul(derivative, slopes), above);
}
