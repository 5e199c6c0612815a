/**
 * A network's shape in memory: the number of hidden layers L, then the widths of the inputs and of each hidden layer
 * (all i32). Layer 0 are the inputs, layers 1 … L the hidden ones, layer L + 1 is the single output.
 *
 * All matrices lie in panels: eight neighbouring columns of all rows, then the next eight. Widths are filled up to a
 * multiple of eight with zeros, which stay zeros through training, so that no loop has a ragged end.
 */
export function hiddenLayers(shape: usize): i32 {
  return load<i32>(shape);
}

export function widthOf(shape: usize, layer: i32): i32 {
  return load<i32>(shape + ((<usize>layer + 1) << 2));
}

/** Rounded up to a multiple of four. */
export function fours(count: i32): i32 {
  return (count + 3) & ~3;
}

/** Rounded up to a multiple of eight. */
export function eights(count: i32): i32 {
  return (count + 7) & ~7;
}

/**
 * Bytes from one panel of a matrix with a row a design to the next. A cache line lies between panels: without it, the
 * same row of all panels would fall on the same few places of the cache where rows are a power of two.
 */
export function panelBytes(rows: i32): usize {
  return ((<usize>rows) << 5) + 64;
}

/** Bytes of a panel-wise matrix with a row a design. */
export function layerBytes(rows: i32, columns: i32): usize {
  return panelBytes(rows) * <usize>(eights(columns) >> 3);
}

/** Bytes of a panel-wise matrix of parameters. */
export function matrixBytes(rows: i32, columns: i32): usize {
  return (<usize>rows * <usize>eights(columns)) << 2;
}

/** Bytes from the start of the parameters to the biases of a layer from 1 to L + 1. */
export function biasesOffset(shape: usize, layer: i32): usize {
  let offset: usize = 0;
  for (let l = 1; l < layer; l++) {
    offset += matrixBytes(1 + eights(widthOf(shape, l - 1)), widthOf(shape, l));
  }
  return offset;
}

/** Bytes from the start of the parameters to the weights of a layer from 1 to L + 1. */
export function weightsOffset(shape: usize, layer: i32): usize {
  const outputs = layer > hiddenLayers(shape) ? 1 : widthOf(shape, layer);
  return biasesOffset(shape, layer) + matrixBytes(1, outputs);
}

/** Bytes of all parameters of one network. */
export function parameterBytes(shape: usize): usize {
  const last = hiddenLayers(shape);
  return weightsOffset(shape, last + 1) + matrixBytes(1, widthOf(shape, last));
}

/** Bytes from the start of the transposed weights to those of a hidden layer; L + 1 gives the bytes of all. */
export function transposedOffset(shape: usize, layer: i32): usize {
  let offset: usize = 0;
  for (let l = 1; l < layer; l++) offset += matrixBytes(eights(widthOf(shape, l - 1)), widthOf(shape, l));
  return offset;
}

/** Bytes from the start of the activations of `rows` rows to those of a layer; L + 1 gives the bytes of all. */
export function activationsOffset(shape: usize, rows: i32, layer: i32): usize {
  let offset: usize = 0;
  for (let l = 0; l < layer; l++) offset += layerBytes(rows, widthOf(shape, l));
  return offset;
}
