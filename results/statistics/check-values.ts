/**
 * Refuses what a statistic can't be made of, so that a missing number is never dropped in silence.
 *
 * @param name what the values are, for the message, such as "differences".
 * @throws RangeError naming the position of the first value that isn't a finite number, or the count when there are
 * fewer values than `atLeast`.
 */
export function checkValues(values: ArrayLike<number>, name = 'values', atLeast = 1): void {
  if (values.length < atLeast)
    throw new RangeError(`${name}: at least ${atLeast} needed, got ${values.length}`);
  for (let i = 0; i < values.length; i++) {
    if (!Number.isFinite(values[i]))
      throw new RangeError(`${name}: position ${i} is ${values[i]}, not a finite number`);
  }
}

/** Refuses anything but a share strictly between 0 and 1. */
export function checkShare(share: number, name: string): void {
  if (!(share > 0 && share < 1)) throw new RangeError(`${name} must lie between 0 and 1, got ${share}`);
}

/** Refuses anything but a whole number of at least `atLeast`. */
export function checkCount(count: number, name: string, atLeast = 1): void {
  if (!Number.isSafeInteger(count) || count < atLeast)
    throw new RangeError(`${name} must be a whole number of at least ${atLeast}, got ${count}`);
}
