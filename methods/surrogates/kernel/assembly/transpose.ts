import { eights, hiddenLayers, transposedOffset, weightsOffset, widthOf } from './shape';

/** Writes the transposed weights of the hidden layers from `first` on, panel-wise as well. */
export function transposeWeights(shape: usize, parameters: usize, transposed: usize, first: i32): void {
  const last = hiddenLayers(shape);
  for (let layer = first; layer <= last; layer++) {
    const inputs = eights(widthOf(shape, layer - 1));
    const outputs = eights(widthOf(shape, layer));
    let from = parameters + weightsOffset(shape, layer);
    const to = transposed + transposedOffset(shape, layer);
    for (let p = 0; p < outputs; p += 8) {
      for (let q = 0; q < inputs; q += 8) {
        transposeBlock(from, to + ((<usize>q * <usize>outputs + ((<usize>p) << 3)) << 2));
        from += 256;
      }
    }
  }
}

/** Transposes a block of 8 × 8 numbers that lie one after another. */
function transposeBlock(from: usize, to: usize): void {
  transposeTile(from, to, 32);
  transposeTile(from + 16, to + 128, 32);
  transposeTile(from + 128, to + 16, 32);
  transposeTile(from + 144, to + 144, 32);
}

/** Transposes a block of 4 × 4 numbers whose rows are 32 bytes apart, to rows `step` bytes apart. */
export function transposeTile(from: usize, to: usize, step: usize): void {
  const r0 = v128.load(from);
  const r1 = v128.load(from, 32);
  const r2 = v128.load(from, 64);
  const r3 = v128.load(from, 96);
  const low01 = v128.shuffle<f32>(r0, r1, 0, 4, 1, 5);
  const low23 = v128.shuffle<f32>(r2, r3, 0, 4, 1, 5);
  const high01 = v128.shuffle<f32>(r0, r1, 2, 6, 3, 7);
  const high23 = v128.shuffle<f32>(r2, r3, 2, 6, 3, 7);
  v128.store(to, v128.shuffle<f32>(low01, low23, 0, 1, 4, 5));
  v128.store(to + step, v128.shuffle<f32>(low01, low23, 2, 3, 6, 7));
  v128.store(to + 2 * step, v128.shuffle<f32>(high01, high23, 0, 1, 4, 5));
  v128.store(to + 3 * step, v128.shuffle<f32>(high01, high23, 2, 3, 6, 7));
}
