import { boundGradient } from './input-gradient';
import { mostRows } from './networks';
import { project } from './project';
import { features } from './space';

/**
 * Projected gradient ascent of mean − spreadWeight · spread of the outputs, in place on `count` encoded rows (f64):
 * `steps` times x ← project(x + rate · gradient). Every `traceEvery` steps and after the last one, the rows are copied
 * to `trace`, one record of all rows after another; no trace where `traceEvery` is 0. `gradient` holds as many numbers
 * as `mostRows` rows.
 */
export function ascend(
  x: usize,
  count: i32,
  steps: i32,
  rate: f64,
  spreadWeight: f64,
  gradient: usize,
  trace: usize,
  traceEvery: i32,
): void {
  const rowBytes = (<usize>features) << 3;
  for (let start = 0; start < count; start += mostRows) {
    const some = min(mostRows, count - start);
    const bytes = <usize>some * rowBytes;
    const from = x + <usize>start * rowBytes;
    let record = trace + <usize>start * rowBytes;
    for (let step = 1; step <= steps; step++) {
      boundGradient(from, some, gradient, spreadWeight, 1);
      stepAlong(from, gradient, bytes, rate);
      project(from, some);
      if (traceEvery && (step % traceEvery == 0 || step == steps)) {
        memory.copy(record, from, bytes);
        record += <usize>count * rowBytes;
      }
    }
  }
}

/** x ← x + rate · gradient. */
function stepAlong(x: usize, gradient: usize, bytes: usize, rate: f64): void {
  const rates = f64x2.splat(rate);
  const pairs = bytes & ~15;
  for (let at: usize = 0; at < pairs; at += 16) {
    v128.store(x + at, f64x2.add(v128.load(x + at), f64x2.mul(rates, v128.load(gradient + at))));
  }
  if (bytes > pairs) store<f64>(x + pairs, load<f64>(x + pairs) + rate * load<f64>(gradient + pairs));
}
