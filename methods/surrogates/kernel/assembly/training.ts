import { adamStep, beginAdam } from './adam';
import { addPenalty, mine, minedRows } from './conservatism';
import { clearInputs, enterRows, enterTableRows, prepareTable } from './inputs';
import { parametersOf, shape, slope, transposedOf, transposeMembers, work } from './networks';
import { backward, forward } from './passes';
import { fours, parameterBytes } from './shape';
import { outputDerivativesAt, outputsAt } from './workspace';

let x: usize = 0;
let table: usize = 0;
let targets: usize = 0;
let learningRate: f64 = 0;
let weightDecay: f64 = 0;
let means: usize = 0;
let squares: usize = 0;
let gradient: usize = 0;

/**
 * Begins the training of one network on a table of `count` encoded rows (f64, row-major) and their standardized scores
 * (f64). `prepared` has room for `tableBytes`, `moments` for three times the network's parameters.
 */
export function beginTraining(
  rows: usize,
  count: i32,
  scores: usize,
  prepared: usize,
  moments: usize,
  rate: f64,
  decay: f64,
): void {
  const bytes = parameterBytes(shape);
  x = rows;
  table = prepared;
  targets = scores;
  learningRate = rate;
  weightDecay = decay;
  means = moments;
  squares = means + bytes;
  gradient = squares + bytes;
  memory.fill(moments, 0, 3 * bytes);
  prepareTable(rows, count, table);
  beginAdam();
}

/**
 * Takes `steps` training steps; step s uses the next `sizes[s]` (i32) of the row numbers in `order` (i32). Writes the
 * mean squared error of each step, before it, to `losses` (f64).
 */
export function train(order: usize, sizes: usize, steps: i32, losses: usize): void {
  let at = order;
  for (let s: usize = 0; s < <usize>steps; s++) {
    const size = load<i32>(sizes + (s << 2));
    store<f64>(losses + (s << 3), trainingStep(at, size));
    at += (<usize>size) << 2;
  }
}

/** Mean squared error of the named rows, and in the gradient's memory its gradient with the penalty's. */
export function lossGradient(order: usize, size: i32): f64 {
  const count = min(size, minedRows);
  const rows = fours(size + count);
  transposeMembers(count > 0 ? 1 : 2);
  const mined = count > 0 ? mine(x, order, count) : 0;
  clearInputs(rows);
  enterTableRows(table, order, size, rows);
  if (count > 0) enterRows(mined, count, rows, size);
  forward(shape, parametersOf(0), work, rows, slope);
  const loss = lossDerivatives(order, size, rows);
  if (count > 0)
    addPenalty(outputsAt(shape, work, rows), outputDerivativesAt(shape, work, rows), size, count);
  backward(shape, parametersOf(0), transposedOf(0), work, rows, size + count, gradient, false, slope);
  return loss;
}

function trainingStep(order: usize, size: i32): f64 {
  const loss = lossGradient(order, size);
  adamStep(parametersOf(0), means, squares, gradient, parameterBytes(shape), learningRate, weightDecay);
  return loss;
}

function lossDerivatives(order: usize, size: i32, rows: i32): f64 {
  const outputs = outputsAt(shape, work, rows);
  const derivatives = outputDerivativesAt(shape, work, rows);
  memory.fill(derivatives, 0, (<usize>rows) << 2);
  let sum: f64 = 0;
  for (let i: usize = 0; i < <usize>size; i++) {
    const target = load<f64>(targets + ((<usize>load<i32>(order + (i << 2))) << 3));
    const off = <f64>load<f32>(outputs + (i << 2)) - target;
    sum += off * off;
    store<f32>(derivatives + (i << 2), <f32>((2.0 / <f64>size) * off));
  }
  return sum / <f64>size;
}
