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
      for (let at: usize = 0; at < bytes; at += 8) {
        store<f64>(from + at, load<f64>(from + at) + rate * load<f64>(gradient + at));
      }
      project(from, some);
      if (traceEvery && (step % traceEvery == 0 || step == steps)) {
        memory.copy(record, from, bytes);
        record += <usize>count * rowBytes;
      }
    }
  }
}
