/** Encoded features in a row. */
export let features: i32 = 0;

/** Blocks of the encoding: for each column (i32) whether it is a category, its first feature, how many it has. */
export let blocks: usize = 0;

export let blockCount: i32 = 0;

/** Scaling of the features, f64 each: input = (feature − shift) · factor. */
export let shifts: usize = 0;

export let factors: usize = 0;

/** Whether some columns are categories, so that rows are kept as lists of what is not zero in them. */
export let listing: bool = false;

/** Says which space the rows of all further calls come from; before `useNetworks`. */
export function useSpace(width: i32, blocksAt: usize, count: i32, shiftsAt: usize, factorsAt: usize): void {
  features = width;
  blocks = blocksAt;
  blockCount = count;
  shifts = shiftsAt;
  factors = factorsAt;
  listing = false;
  for (let b = 0; b < count; b++) if (isCategory(b)) listing = true;
}

export function isCategory(block: i32): bool {
  return load<i32>(blocks + <usize>block * 12) != 0;
}

export function firstFeature(block: i32): i32 {
  return load<i32>(blocks + <usize>block * 12, 4);
}

export function featureCount(block: i32): i32 {
  return load<i32>(blocks + <usize>block * 12, 8);
}

export function shiftOf(feature: i32): f64 {
  return load<f64>(shifts + ((<usize>feature) << 3));
}

export function factorOf(feature: i32): f64 {
  return load<f64>(factors + ((<usize>feature) << 3));
}
