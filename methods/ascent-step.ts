import type { Matrix } from '../harness/designs.js';
import { type Encoding, projectInPlace } from '../harness/encoding.js';

/**
 * One step of projected gradient ascent on encoded rows, in place: x ← project(x + stepSize · √width · gradient), with
 * the gradient taken of scores in standard deviations of the table. The factor √width keeps the reach of a step the
 * same however many columns share the score (the step rule of conservative objective models, ICML 2021, appendix).
 */
export function ascentStep(encoding: Encoding, x: Matrix, gradient: Matrix, stepSize: number): void {
  const rate = stepSize * Math.sqrt(encoding.width);
  for (let i = 0; i < x.values.length; i++) x.values[i]! += rate * gradient.values[i]!;
  projectInPlace(encoding, x);
}
