import { clearInputs, enterRows } from './inputs';
import {
  gradientBytes,
  memberGradients,
  memberOutputs,
  memberShares,
  members,
  mostRows,
  parametersOf,
  shape,
  slope,
  transposedOf,
  work,
} from './networks';
import { backward, forward } from './passes';
import { fours, panelBytes } from './shape';
import { factorOf, factors, features } from './space';
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
  for (let i = 0; i < count; i++) {
    shareOut(i, spreadWeight);
    combine(i, rows, gradient + ((<usize>i * <usize>features) << 3), scale);
  }
}

/** Each member's share in the gradient of a row: 1/M − w · (output − mean) / ((M − 1) · spread). */
function shareOut(row: i32, spreadWeight: f64): void {
  const mean = meanOutput(row);
  const spread = members > 1 ? spreadOfOutputs(row, mean) : 0;
  for (let m = 0; m < members; m++) {
    const off = <f64>load<f32>(outputOf(m, row)) - mean;
    const doubt = spread > 0 ? off / (<f64>(members - 1) * spread) : 0;
    store<f64>(memberShares + ((<usize>m) << 3), 1.0 / <f64>members - spreadWeight * doubt);
  }
}

/** Adds up the members' gradients of a row by their shares, by encoded features instead of inputs. */
function combine(row: i32, rows: i32, to: usize, scale: f64): void {
  const scales = f64x2.splat(scale);
  const pairs = features >> 1;
  let place = (<usize>row) << 5;
  for (let k = 0; k < pairs; k++) {
    let sum = f64x2.splat(0);
    for (let m = 0; m < members; m++) {
      const share = v128.load_splat<f64>(memberShares + ((<usize>m) << 3));
      const slopes = f64x2.promote_low_f32x4(v128.load_zero<f64>(gradientOf(m) + place));
      sum = f64x2.add(sum, f64x2.mul(share, slopes));
    }
    const offset = (<usize>k) << 4;
    v128.store(to + offset, f64x2.mul(f64x2.mul(sum, v128.load(factors + offset)), scales));
    place += (k & 3) == 3 ? panelBytes(rows) - 24 : 8;
  }
  if (features & 1) {
    let sum: f64 = 0;
    for (let m = 0; m < members; m++) {
      sum += load<f64>(memberShares + ((<usize>m) << 3)) * <f64>load<f32>(gradientOf(m) + place);
    }
    store<f64>(to + ((<usize>(features - 1)) << 3), sum * factorOf(features - 1) * scale);
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
