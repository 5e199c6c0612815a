import { entryBytes } from './lists';
import { leaky } from './products';
import { panelBytes } from './shape';
import { blockCount, factorOf, featureCount, firstFeature, isCategory, shiftOf } from './space';

/** The biases of the first layer less what the shifts of all levels take off every row. */
export function shiftedBiases(
  biases: usize,
  weights: usize,
  shifted: usize,
  inputRows: i32,
  panels: i32,
): void {
  for (let p: usize = 0; p < <usize>panels; p++) {
    let left = v128.load(biases + (p << 5));
    let right = v128.load(biases + (p << 5), 16);
    for (let b = 0; b < blockCount; b++) {
      if (!isCategory(b)) continue;
      const first = firstFeature(b);
      const shift = v128.splat<f32>(<f32>(shiftOf(first) * factorOf(first)));
      let at = weights + ((p * <usize>inputRows + <usize>first) << 5);
      let leftSum = v128.splat<f32>(0);
      let rightSum = leftSum;
      for (let l = featureCount(b); l > 0; l--) {
        leftSum = f32x4.add(leftSum, v128.load(at));
        rightSum = f32x4.add(rightSum, v128.load(at, 16));
        at += 32;
      }
      left = f32x4.sub(left, f32x4.mul(shift, leftSum));
      right = f32x4.sub(right, f32x4.mul(shift, rightSum));
    }
    v128.store(shifted + (p << 5), left);
    v128.store(shifted + (p << 5), right, 16);
  }
}

/** Activations of the first layer for listed rows: by letters, not by letters × levels. */
export function listedForward(
  heads: usize,
  biases: usize,
  weights: usize,
  to: usize,
  rows: i32,
  inputRows: i32,
  panels: i32,
  slope: f32,
): void {
  const slopes = f32x4.splat(slope);
  const stride = panelBytes(rows);
  const panel = (<usize>inputRows) << 5;
  for (let i: usize = 0; i < <usize>rows; i++) {
    const list = <usize>load<i32>(heads + i * entryBytes);
    const end = list + <usize>load<i32>(heads + i * entryBytes, 4) * entryBytes;
    const units = to + (i << 5);
    let p = 0;
    for (; p + 4 <= panels; p += 4) {
      const bias = biases + ((<usize>p) << 5);
      const at = units + <usize>p * stride;
      const w0 = weights + <usize>p * panel;
      const w1 = w0 + panel;
      const w2 = w1 + panel;
      const w3 = w2 + panel;
      let c00 = v128.load(bias);
      let c01 = v128.load(bias, 16);
      let c10 = v128.load(bias, 32);
      let c11 = v128.load(bias, 48);
      let c20 = v128.load(bias, 64);
      let c21 = v128.load(bias, 80);
      let c30 = v128.load(bias, 96);
      let c31 = v128.load(bias, 112);
      for (let e = list; e < end; e += entryBytes) {
        const j = <usize>load<i32>(e);
        const value = v128.load_splat<f32>(e, 4);
        c00 = f32x4.add(c00, f32x4.mul(value, v128.load(w0 + j)));
        c01 = f32x4.add(c01, f32x4.mul(value, v128.load(w0 + j, 16)));
        c10 = f32x4.add(c10, f32x4.mul(value, v128.load(w1 + j)));
        c11 = f32x4.add(c11, f32x4.mul(value, v128.load(w1 + j, 16)));
        c20 = f32x4.add(c20, f32x4.mul(value, v128.load(w2 + j)));
        c21 = f32x4.add(c21, f32x4.mul(value, v128.load(w2 + j, 16)));
        c30 = f32x4.add(c30, f32x4.mul(value, v128.load(w3 + j)));
        c31 = f32x4.add(c31, f32x4.mul(value, v128.load(w3 + j, 16)));
      }
      storeUnits(at, c00, c01, slopes);
      storeUnits(at + stride, c10, c11, slopes);
      storeUnits(at + 2 * stride, c20, c21, slopes);
      storeUnits(at + 3 * stride, c30, c31, slopes);
    }
    for (; p < panels; p++) {
      const w = weights + <usize>p * panel;
      let left = v128.load(biases + ((<usize>p) << 5));
      let right = v128.load(biases + ((<usize>p) << 5), 16);
      for (let e = list; e < end; e += entryBytes) {
        const j = <usize>load<i32>(e);
        const value = v128.load_splat<f32>(e, 4);
        left = f32x4.add(left, f32x4.mul(value, v128.load(w + j)));
        right = f32x4.add(right, f32x4.mul(value, v128.load(w + j, 16)));
      }
      storeUnits(units + <usize>p * stride, left, right, slopes);
    }
  }
}

/** Gradient of the first layer's weights from listed rows; `biases` holds that of its biases. */
export function listedGradient(
  heads: usize,
  derivatives: usize,
  biases: usize,
  gradient: usize,
  rows: i32,
  count: i32,
  inputRows: i32,
  panels: i32,
): void {
  for (let p: usize = 0; p < <usize>panels; p++) {
    const panel = gradient + ((p * <usize>inputRows) << 5);
    startFromShifts(panel, v128.load(biases + (p << 5)), v128.load(biases + (p << 5), 16), inputRows);
    let from = derivatives + p * panelBytes(rows);
    for (let i: usize = 0; i < <usize>count; i++) {
      const left = v128.load(from);
      const right = v128.load(from, 16);
      const list = <usize>load<i32>(heads + i * entryBytes);
      const end = list + <usize>load<i32>(heads + i * entryBytes, 4) * entryBytes;
      for (let e = list; e < end; e += entryBytes) {
        const at = panel + <usize>load<i32>(e);
        const value = v128.load_splat<f32>(e, 4);
        v128.store(at, f32x4.add(v128.load(at), f32x4.mul(value, left)));
        v128.store(at, f32x4.add(v128.load(at, 16), f32x4.mul(value, right)), 16);
      }
      from += 32;
    }
  }
}

/** Sets a panel of the gradient to what the shifts of levels add to it: −shift · factor · the biases' gradient. */
function startFromShifts(panel: usize, left: v128, right: v128, inputRows: i32): void {
  memory.fill(panel, 0, (<usize>inputRows) << 5);
  for (let b = 0; b < blockCount; b++) {
    if (!isCategory(b)) continue;
    const first = firstFeature(b);
    const shift = v128.splat<f32>(<f32>(-shiftOf(first) * factorOf(first)));
    const leftPart = f32x4.mul(shift, left);
    const rightPart = f32x4.mul(shift, right);
    let at = panel + ((<usize>first) << 5);
    for (let l = featureCount(b); l > 0; l--) {
      v128.store(at, leftPart);
      v128.store(at, rightPart, 16);
      at += 32;
    }
  }
}

function storeUnits(to: usize, left: v128, right: v128, slopes: v128): void {
  v128.store(to, leaky(left, slopes));
  v128.store(to, leaky(right, slopes), 16);
}
