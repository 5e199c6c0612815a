/** Encoded features in a row. */
export let features: i32 = 0;

/** Blocks of the encoding: for each column (i32) whether it is a category, its first feature, how many it has. */
export let blocks: usize = 0;

export let blockCount: i32 = 0;

/** Scaling of the features, f64 each: input = (feature − shift) · factor. */
export let shifts: usize = 0;

export let factors: usize = 0;

/** Says which space the rows of all further calls come from. */
export function useSpace(width: i32, blocksAt: usize, count: i32, shiftsAt: usize, factorsAt: usize): void {
  features = width;
  blocks = blocksAt;
  blockCount = count;
  shifts = shiftsAt;
  factors = factorsAt;
}
