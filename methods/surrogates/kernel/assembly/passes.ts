import { listedForward, listedGradient, shiftedBiases } from './listed-layer';
import { firstBiases, heads, tile } from './networks';
import { outputUnit, throughOutputUnit } from './output-unit';
import { asIs, asUnits, multiply, multiplyTransposed, sumRows, throughUnits } from './products';
import { biasesOffset, eights, hiddenLayers, transposedOffset, weightsOffset, widthOf } from './shape';
import { listing } from './space';
import { activationsAt, derivativesAt, outputDerivativesAt, outputsAt } from './workspace';

/** From the inputs in the workspace to activations and outputs. */
export function forward(shape: usize, parameters: usize, work: usize, rows: i32, slope: f32): void {
  const last = hiddenLayers(shape);
  for (let layer = 1; layer <= last; layer++) {
    const inputs = widthOf(shape, layer - 1);
    const panels = eights(widthOf(shape, layer)) >> 3;
    const weights = parameters + weightsOffset(shape, layer);
    const biases = parameters + biasesOffset(shape, layer);
    const to = activationsAt(shape, work, rows, layer);
    if (layer == 1 && listing) {
      shiftedBiases(biases, weights, firstBiases, eights(inputs), panels);
      listedForward(heads, firstBiases, weights, to, rows, eights(inputs), panels, slope);
    } else {
      const from = activationsAt(shape, work, rows, layer - 1);
      multiply(from, weights, to, rows, inputs, eights(inputs), panels, asUnits, biases, slope, tile);
    }
  }
  outputUnit(
    activationsAt(shape, work, rows, last),
    load<f32>(parameters + biasesOffset(shape, last + 1)),
    parameters + weightsOffset(shape, last + 1),
    outputsAt(shape, work, rows),
    rows,
    eights(widthOf(shape, last)) >> 3,
  );
}

/**
 * From the derivatives by each output back to the first hidden layer, and with `toInputs` to the inputs; needs the
 * transposed weights of the layers it passes. With `gradient` not 0, writes the gradient of the parameters there, from
 * the first `count` rows.
 */
export function backward(
  shape: usize,
  parameters: usize,
  transposed: usize,
  work: usize,
  rows: i32,
  count: i32,
  gradient: usize,
  toInputs: bool,
  slope: f32,
): void {
  const last = hiddenLayers(shape);
  const outputWeights = weightsOffset(shape, last + 1);
  const outputDerivatives = outputDerivativesAt(shape, work, rows);
  throughOutputUnit(
    activationsAt(shape, work, rows, last),
    parameters + outputWeights,
    outputDerivatives,
    derivativesAt(shape, work, rows, last),
    gradient ? gradient + outputWeights : 0,
    rows,
    eights(widthOf(shape, last)) >> 3,
    slope,
  );
  if (gradient) {
    let sum: f64 = 0;
    for (let i: usize = 0; i < <usize>count; i++) sum += load<f32>(outputDerivatives + (i << 2));
    store<f32>(gradient + biasesOffset(shape, last + 1), <f32>sum);
  }
  for (let layer = last; layer >= 1; layer--) {
    const inputs = widthOf(shape, layer - 1);
    const panels = eights(widthOf(shape, layer)) >> 3;
    const before = activationsAt(shape, work, rows, layer - 1);
    const derivatives = derivativesAt(shape, work, rows, layer);
    if (gradient) {
      const weights = gradient + weightsOffset(shape, layer);
      const biases = gradient + biasesOffset(shape, layer);
      sumRows(derivatives, biases, rows, count, panels);
      if (layer == 1 && listing) {
        listedGradient(heads, derivatives, biases, weights, rows, count, eights(inputs), panels);
      } else {
        multiplyTransposed(before, derivatives, weights, rows, count, inputs, eights(inputs), panels, tile);
      }
    }
    if (layer > 1 || toInputs) {
      multiply(
        derivatives,
        transposed + transposedOffset(shape, layer),
        derivativesAt(shape, work, rows, layer - 1),
        rows,
        widthOf(shape, layer),
        panels << 3,
        eights(inputs) >> 3,
        layer > 1 ? throughUnits : asIs,
        before,
        slope,
        tile,
      );
    }
  }
}
