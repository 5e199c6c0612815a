/**
 * Matérn kernel with ν = 5/2 and amplitude 1, (1 + √5 r + 5r²/3) exp(−√5 r), of the squared scaled distance r²
 * (Rasmussen & Williams 2006, eq. 4.17).
 */
export function matern52(squaredDistance: number): number {
  const r = Math.sqrt(5 * squaredDistance);
  return (1 + r + (r * r) / 3) * Math.exp(-r);
}

/** Derivative of `matern52` with respect to the squared distance: −5/6 (1 + √5 r) exp(−√5 r). */
export function matern52Slope(squaredDistance: number): number {
  const r = Math.sqrt(5 * squaredDistance);
  return (-5 / 6) * (1 + r) * Math.exp(-r);
}
