import { through } from './products';
import { panelBytes } from './shape';

/** The output of each row: bias + weights · activations of the last hidden layer. */
export function outputUnit(
  activations: usize,
  bias: f32,
  weights: usize,
  outputs: usize,
  rows: i32,
  panels: i32,
): void {
  const stride = panelBytes(rows);
  for (let i = 0; i < rows; i++) {
    let at = activations + ((<usize>i) << 5);
    let left = v128.splat<f32>(0);
    let right = left;
    for (let p: usize = 0; p < <usize>panels; p++) {
      left = f32x4.add(left, f32x4.mul(v128.load(at), v128.load(weights + (p << 5))));
      right = f32x4.add(right, f32x4.mul(v128.load(at, 16), v128.load(weights + (p << 5), 16)));
      at += stride;
    }
    const sum = f32x4.add(left, right);
    const even = f32x4.extract_lane(sum, 0) + f32x4.extract_lane(sum, 2);
    const odd = f32x4.extract_lane(sum, 1) + f32x4.extract_lane(sum, 3);
    store<f32>(outputs + ((<usize>i) << 2), bias + (even + odd));
  }
}

/**
 * Takes derivatives by each output back to the last hidden layer; with `gradient` not 0, also sums the gradient of the
 * output's weights there. Rows beyond the asked ones have derivative 0.
 */
export function throughOutputUnit(
  activations: usize,
  weights: usize,
  outputDerivatives: usize,
  derivatives: usize,
  gradient: usize,
  rows: i32,
  panels: i32,
  slope: f32,
): void {
  const slopes = f32x4.splat(slope);
  const stride = panelBytes(rows);
  for (let p: usize = 0; p < <usize>panels; p++) {
    let at = activations + p * stride;
    let to = derivatives + p * stride;
    const w0 = v128.load(weights + (p << 5));
    const w1 = v128.load(weights + (p << 5), 16);
    let left = v128.splat<f32>(0);
    let right = left;
    for (let i: usize = 0; i < <usize>rows; i++) {
      const d = v128.load_splat<f32>(outputDerivatives + (i << 2));
      const h0 = v128.load(at);
      const h1 = v128.load(at, 16);
      left = f32x4.add(left, f32x4.mul(d, h0));
      right = f32x4.add(right, f32x4.mul(d, h1));
      v128.store(to, through(f32x4.mul(d, w0), h0, slopes));
      v128.store(to, through(f32x4.mul(d, w1), h1, slopes), 16);
      at += 32;
      to += 32;
    }
    if (gradient) {
      v128.store(gradient + (p << 5), left);
      v128.store(gradient + (p << 5), right, 16);
    }
  }
}
