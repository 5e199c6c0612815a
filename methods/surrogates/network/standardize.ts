import { scoreScale } from '../../table.js';
import type { OutputScaling } from './trained-network.js';

/** Scores as a network learns them, with mean 0 and standard deviation 1, and the way back. */
export function standardize(scores: Float64Array): { targets: Float64Array; scale: OutputScaling } {
  const scale = scoreScale(scores);
  return { targets: scores.map((score) => (score - scale.mean) / scale.deviation), scale };
}
