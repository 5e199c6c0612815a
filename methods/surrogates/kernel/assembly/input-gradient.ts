import { clearInputs, enterRows, placeOf } from './inputs';
import {
  gradientBytes,
  memberGradients,
  memberOutputs,
  members,
  mostRows,
  parametersOf,
  shape,
  slope,
  transposedOf,
  work,
} from './networks';
import { backward, forward } from './passes';
import { fours } from './shape';
import { factors, features } from './space';
import { derivativesAt, outputDerivativesAt, outputsAt } from './workspace';

/**
 * Gradient of mean − spreadWeight · spread of the members' outputs by the encoded features, times `scale`, for at most
 * `mostRows` rows: (count, features) in f64. The spread is the standard deviation with divisor members − 1. Needs the
 * transposed weights of all layers; leaves the outputs in `memberOutputs`.
 */
export function boundGradient(x: usize, count: i32, gradient: usize, spreadWeight: f64, scale: f64): void {
  const rows = fours(count);
  clearInputs(rows);
  enterRows(x, count, rows, 0);
  const outputDerivatives = outputDerivativesAt(shape, work, rows);
  memory.fill(outputDerivatives, 0, (<usize>rows) << 2);
  for (let i: usize = 0; i < <usize>count; i++) store<f32>(outputDerivatives + (i << 2), 1);
  for (let m = 0; m < members; m++) {
    forward(shape, parametersOf(m), work, rows, slope);
    backward(shape, parametersOf(m), transposedOf(m), work, rows, count, 0, true, slope);
    memory.copy(outputOf(m, 0), outputsAt(shape, work, rows), (<usize>rows) << 2);
    memory.copy(gradientOf(m), derivativesAt(shape, work, rows, 0), gradientBytes(rows));
  }
  memory.fill(gradient, 0, (<usize>count * <usize>features) << 3);
  for (let i = 0; i < count; i++) {
    const row = gradient + ((<usize>i * <usize>features) << 3);
    const mean = meanOutput(i);
    const spread = members > 1 ? spreadOfOutputs(i, mean) : 0;
    for (let m = 0; m < members; m++) {
      const doubt = spread > 0 ? (<f64>load<f32>(outputOf(m, i)) - mean) / (<f64>(members - 1) * spread) : 0;
      const share = 1.0 / <f64>members - spreadWeight * doubt;
      for (let j = 0; j < features; j++) {
        const at = row + ((<usize>j) << 3);
        const slopeAt = <f64>load<f32>(gradientOf(m) + placeOf(i, j, rows));
        store<f64>(at, load<f64>(at) + share * slopeAt * load<f64>(factors + ((<usize>j) << 3)) * scale);
      }
    }
  }
}

/** The same for any number of rows; also writes the members' outputs (f32, member by member). */
export function gradients(
  x: usize,
  count: i32,
  outputs: usize,
  gradient: usize,
  spreadWeight: f64,
  scale: f64,
): void {
  for (let start = 0; start < count; start += mostRows) {
    const some = min(mostRows, count - start);
    const offset = (<usize>start * <usize>features) << 3;
    boundGradient(x + offset, some, gradient + offset, spreadWeight, scale);
    for (let m = 0; m < members; m++) {
      const to = outputs + ((<usize>m * <usize>count + <usize>start) << 2);
      memory.copy(to, outputOf(m, 0), (<usize>some) << 2);
    }
  }
}

function outputOf(member: i32, row: i32): usize {
  return memberOutputs + ((<usize>member * <usize>mostRows + <usize>row) << 2);
}

function gradientOf(member: i32): usize {
  return memberGradients + <usize>member * gradientBytes(mostRows);
}

/** Summed as differences to the first member, so that members that agree have no spread from rounding. */
function meanOutput(row: i32): f64 {
  const first = <f64>load<f32>(outputOf(0, row));
  let sum: f64 = 0;
  for (let m = 1; m < members; m++) sum += <f64>load<f32>(outputOf(m, row)) - first;
  return first + sum / <f64>members;
}

function spreadOfOutputs(row: i32, mean: f64): f64 {
  let squares: f64 = 0;
  for (let m = 0; m < members; m++) {
    const off = <f64>load<f32>(outputOf(m, row)) - mean;
    squares += off * off;
  }
  return Math.sqrt(squares / <f64>(members - 1));
}
