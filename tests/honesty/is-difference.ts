import type { VerdictWord } from '../../results/verdict.js';

/** Whether a verdict says that a method differs from the reference. */
export function isDifference(verdict: VerdictWord): boolean {
  return verdict === 'helps' || verdict === 'hurts';
}
