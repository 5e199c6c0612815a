/**
 * Holm's step-down adjustment (Holm 1979): the smallest p-value times m, the next times m − 1, and so on, none smaller
 * than the one before, all at most 1. Rejecting where the adjusted value is at most α keeps the chance of any false
 * rejection among the m below α, however the tests depend on each other.
 *
 * @param pValues (m), each in [0, 1]; m may be 0.
 * @returns adjusted values (m), in the order given.
 * @throws RangeError naming the position of a value outside [0, 1].
 */
export function holmAdjust(pValues: ArrayLike<number>): number[] {
  const count = pValues.length;
  for (let i = 0; i < count; i++) {
    if (!(pValues[i]! >= 0 && pValues[i]! <= 1))
      throw new RangeError(`p-values: position ${i} is ${pValues[i]}, not a number from 0 to 1`);
  }
  const ascending = Array.from({ length: count }, (_, i) => i).sort((a, b) => pValues[a]! - pValues[b]!);
  const adjusted = new Array<number>(count).fill(0);
  let largest = 0;
  ascending.forEach((i, step) => {
    largest = Math.max(largest, Math.min(1, (count - step) * pValues[i]!));
    adjusted[i] = largest;
  });
  return adjusted;
}
