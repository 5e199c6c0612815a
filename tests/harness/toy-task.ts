import type { Designs } from '../../harness/designs.js';
import { rowView } from '../../harness/designs.js';
import { encode, makeEncoding } from '../../harness/encoding.js';
import type { Stream } from '../../harness/random.js';
import type { Space } from '../../harness/space.js';
import type { Task } from '../../harness/task.js';

/**
 * A task on any space: the weighted sum of the encoded features with random weights, so that its optimum is known
 * column by column. `step` rounds scores down to multiples of it, which makes ties.
 */
export function toyTask(space: Space, stream: Stream, step = 0): Task {
  const encoding = makeEncoding(space);
  const weights = Float64Array.from({ length: encoding.width }, () => stream.normal());
  const truth = (designs: Designs) => {
    const encoded = encode(encoding, designs);
    return Float64Array.from({ length: designs.rows }, (_, i) => {
      const score = rowView(encoded, i).reduce((sum, feature, k) => sum + feature * weights[k]!, 0);
      return step > 0 ? step * Math.floor(score / step) : score;
    });
  };
  const design = Float64Array.from(encoding.blocks, ({ column, offset, width }) => {
    if (column.kind !== 'category') return weights[offset]! > 0 ? column.high : column.low;
    const own = weights.subarray(offset, offset + width);
    return own.indexOf(Math.max(...own));
  });
  const value = truth({ rows: 1, columns: space.columns.length, values: design })[0]!;
  return { space, truth, optimum: { value, design, known: 'exact' } };
}

/** The same task with its best design kept secret. */
export function withoutDesign({ optimum, ...task }: Task): Task {
  return { ...task, optimum: { value: optimum.value, known: 'best-known' } };
}
