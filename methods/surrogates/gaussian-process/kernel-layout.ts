import type { Encoding } from '../../../harness/encoding.js';

/** Which length scale each feature of an encoded row has. */
export interface KernelLayout {
  readonly width: number;
  /** How many length scales there are. */
  readonly groups: number;
  /** The length scale of each feature, (width). */
  readonly groupOf: Int32Array;
  /** The features of continuous and integer columns. */
  readonly scaled: Int32Array;
  /** The features of category columns. */
  readonly oneHot: Int32Array;
}

/**
 * One length scale a column of the space (a category's one-hot features share theirs), or a single one for all
 * columns when there are more than `sharedAbove`: so many length scales could not be told from one table.
 */
export function makeKernelLayout({ blocks, width }: Encoding, sharedAbove: number): KernelLayout {
  const shared = blocks.length > sharedAbove;
  const groupOf = new Int32Array(width);
  const scaled: number[] = [];
  const oneHot: number[] = [];
  blocks.forEach((block, j) => {
    for (let f = block.offset; f < block.offset + block.width; f++) {
      groupOf[f] = shared ? 0 : j;
      (block.column.kind === 'category' ? oneHot : scaled).push(f);
    }
  });
  return {
    width,
    groups: shared ? 1 : blocks.length,
    groupOf,
    scaled: Int32Array.from(scaled),
    oneHot: Int32Array.from(oneHot),
  };
}
