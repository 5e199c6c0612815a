import { biasesOffset, eights, hiddenLayers, parameterBytes, weightsOffset, widthOf } from './shape';

/**
 * Puts parameters given layer by layer (weights inputs × outputs row-major, then biases) into panels, or with `back`
 * takes them out again.
 */
export function arrangeParameters(shape: usize, plain: usize, panels: usize, back: bool): void {
  if (!back) memory.fill(panels, 0, parameterBytes(shape));
  const last = hiddenLayers(shape);
  let at = plain;
  for (let layer = 1; layer <= last; layer++) {
    const inputs = widthOf(shape, layer - 1);
    const outputs = widthOf(shape, layer);
    const weights = panels + weightsOffset(shape, layer);
    const biases = panels + biasesOffset(shape, layer);
    for (let i = 0; i < inputs; i++) {
      for (let o = 0; o < outputs; o++) {
        const row = <usize>(o >> 3) * <usize>eights(inputs) + <usize>i;
        at = move(at, weights + (row << 5) + ((<usize>(o & 7)) << 2), back);
      }
    }
    for (let o: usize = 0; o < <usize>outputs; o++) at = move(at, biases + (o << 2), back);
  }
  const inputs = <usize>widthOf(shape, last);
  for (let i: usize = 0; i < inputs; i++) {
    at = move(at, panels + weightsOffset(shape, last + 1) + (i << 2), back);
  }
  move(at, panels + biasesOffset(shape, last + 1), back);
}

function move(plain: usize, panel: usize, back: bool): usize {
  if (back) store<f32>(plain, load<f32>(panel));
  else store<f32>(panel, load<f32>(plain));
  return plain + 4;
}
