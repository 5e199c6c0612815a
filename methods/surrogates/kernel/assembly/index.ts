import { parameterBytes as bytesOfParameters } from './shape';

export { ascend } from './ascent';
export { useConservatism } from './conservatism';
export { gradients } from './input-gradient';
export { tableBytes } from './inputs';
export { scratchBytes, transposeMembers, useNetworks } from './networks';
export { arrangeParameters } from './parameters';
export { predict } from './predict';
export { useSpace } from './space';
export { beginTraining, lossGradient, train } from './training';

/** Bytes of one network's parameters. */
export function parameterBytes(shape: usize): f64 {
  return <f64>bytesOfParameters(shape);
}

/** The first address that the caller may use. */
export function firstAddress(): usize {
  return __heap_base;
}
