import { activationsOffset, hiddenLayers } from './shape';

/**
 * Scratch memory of the passes of one network over `rows` rows (a multiple of four): activations of every layer, their
 * derivatives, outputs and derivatives by outputs.
 */
export function workspaceBytes(shape: usize, rows: i32): usize {
  return outputDerivativesAt(shape, 0, rows) + ((<usize>rows) << 2);
}

export function activationsAt(shape: usize, work: usize, rows: i32, layer: i32): usize {
  return work + activationsOffset(shape, rows, layer);
}

export function derivativesAt(shape: usize, work: usize, rows: i32, layer: i32): usize {
  return activationsAt(shape, work, rows, hiddenLayers(shape) + 1) + activationsOffset(shape, rows, layer);
}

export function outputsAt(shape: usize, work: usize, rows: i32): usize {
  return derivativesAt(shape, work, rows, hiddenLayers(shape) + 1);
}

/** Derivatives of what is to be minimized or maximized by each output. */
export function outputDerivativesAt(shape: usize, work: usize, rows: i32): usize {
  return outputsAt(shape, work, rows) + ((<usize>rows) << 2);
}
