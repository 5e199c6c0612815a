export { adamStep, beginAdam } from './adam';
export { ascend } from './ascent';
export { useConservatism } from './conservatism';
export { gradients } from './input-gradient';
export { tableBytes } from './inputs';
export { scratchBytes, transposeMembers, useNetworks } from './networks';
export { arrangeParameters } from './parameters';
export { predict } from './predict';
export { parameterBytes } from './shape';
export { useSpace } from './space';
export { beginTraining, lossGradient, train } from './training';

/** The first address that the caller may use. */
export function firstAddress(): usize {
  return __heap_base;
}
