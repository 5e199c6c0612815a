import { checkValues } from './check-values.js';

/** How often one sample beats another. */
export interface VarghaDelaney {
  readonly method: 'vargha-delaney';
  /** A: the chance that a value of x exceeds one of y, ties counting half; ½ where neither tends to be larger. */
  readonly a: number;
  /** In words, by how far A lies from ½: from .56 small, .64 medium, .71 large, and the same below ½. */
  readonly magnitude: 'negligible' | 'small' | 'medium' | 'large';
  readonly nX: number;
  readonly nY: number;
}

/**
 * Vargha & Delaney's measure of stochastic superiority, A = P(X > Y) + ½ P(X = Y), over all pairs
 * (Vargha & Delaney 2000). It looks at order alone: any rising scale of the values gives the same.
 *
 * @param x (m), m ≥ 1.
 * @param y (n), n ≥ 1; the two may differ in length.
 * @throws RangeError for an empty sample or a value that isn't finite.
 */
export function varghaDelaney(x: ArrayLike<number>, y: ArrayLike<number>): VarghaDelaney {
  checkValues(x, 'x');
  checkValues(y, 'y');
  let wins = 0;
  for (let i = 0; i < x.length; i++) {
    for (let j = 0; j < y.length; j++) {
      if (x[i]! > y[j]!) wins += 1;
      else if (x[i] === y[j]) wins += 0.5;
    }
  }
  const a = wins / (x.length * y.length);
  return { method: 'vargha-delaney', a, magnitude: magnitudeOf(a), nX: x.length, nY: y.length };
}

function magnitudeOf(a: number): VarghaDelaney['magnitude'] {
  const strength = Math.max(a, 1 - a);
  if (strength < 0.56) return 'negligible';
  if (strength < 0.64) return 'small';
  return strength < 0.71 ? 'medium' : 'large';
}
