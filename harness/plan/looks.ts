/** Looks are at most so many, for each costs a little of what the last one can show. */
export const mostLooks = 20;

/**
 * The numbers of seeds after which verdicts are looked at: rounds of `first` seeds up to `most`, in larger steps where
 * that would be more than 20 looks. The last is `most`.
 *
 * @param first seeds of a round, at least 1.
 * @throws RangeError when `most` is below `first`.
 */
export function planLooks(first: number, most: number): number[] {
  if (most < first) throw new RangeError(`most ${most} is below first ${first}`);
  const step = first * Math.ceil(most / first / mostLooks);
  const looks: number[] = [];
  for (let seeds = step; seeds < most; seeds += step) looks.push(seeds);
  return [...looks, most];
}
