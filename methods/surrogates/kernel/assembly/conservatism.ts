import { ascend } from './ascent';
import { features } from './space';

/** How the weight of a conservative penalty reacts to over-estimation, a step. */
const weightRate: f64 = 0.01;

/** Rows of each training step from which designs are mined; 0 without conservatism. */
export let minedRows: i32 = 0;

let minedSteps: i32 = 0;
let rate: f64 = 0;
let weight: f64 = 0;
let adjusted: bool = false;
let target: f64 = 0;
let mined: usize = 0;
let gradient: usize = 0;

/** Sets the penalty of the training to come; `scratch` has room for 2 · rows encoded rows of f64. */
export function useConservatism(
  rows: i32,
  steps: i32,
  stepRate: f64,
  startWeight: f64,
  adjust: bool,
  overestimation: f64,
  scratch: usize,
): void {
  minedRows = rows;
  minedSteps = steps;
  rate = stepRate;
  weight = startWeight;
  adjusted = adjust;
  target = overestimation;
  mined = scratch;
  gradient = scratch + ((<usize>rows * <usize>features) << 3);
}

/** Copies the named rows of the table and lets them climb the present network; returns where they are. */
export function mine(x: usize, order: usize, count: i32): usize {
  const bytes = (<usize>features) << 3;
  for (let i: usize = 0; i < <usize>count; i++) {
    memory.copy(mined + i * bytes, x + <usize>load<i32>(order + (i << 2)) * bytes, bytes);
  }
  ascend(mined, count, minedSteps, rate, 0, gradient, 0, 0);
  return mined;
}

/** Adds the penalty's derivative by each output; the first `rows` outputs are the table's, `count` mined ones follow. */
export function addPenalty(outputs: usize, derivatives: usize, rows: i32, count: i32): void {
  if (adjusted) {
    const excess = meanOf(outputs + ((<usize>rows) << 2), count) - meanOf(outputs, rows) - target;
    weight = max<f64>(0, weight + weightRate * excess);
  }
  for (let i = 0; i < rows + count; i++) {
    const at = derivatives + ((<usize>i) << 2);
    const push = i < rows ? -weight / <f64>rows : weight / <f64>count;
    store<f32>(at, <f32>(<f64>load<f32>(at) + push));
  }
}

function meanOf(values: usize, count: i32): f64 {
  let sum: f64 = 0;
  for (let i: usize = 0; i < <usize>count; i++) sum += load<f32>(values + (i << 2));
  return sum / <f64>count;
}
