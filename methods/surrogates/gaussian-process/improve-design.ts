import { type Designs, type Matrix, rowView, zeros } from '../../../harness/designs.js';
import { decode, type Encoding, encode } from '../../../harness/encoding.js';
import { type Stream, sampleWithout } from '../../../harness/random.js';
import { countValues } from '../../../harness/space.js';
import { minimizeInBox } from './minimize-in-box.js';

/** A function of encoded rows to climb, (m, width) to (m), with its gradient. */
export interface Climbable {
  value(x: Matrix): Float64Array;
  gradient(x: Matrix): Matrix;
}

/** How much work one improvement may be. */
export interface Effort {
  /** Most alternations of the two kinds of step. */
  readonly rounds: number;
  /** Most quasi-Newton steps over the continuous columns, a round. */
  readonly steps: number;
  /** Most single-column changes tried, a round; where there are more, that many are drawn. */
  readonly tries: number;
}

/** A design, (d), and what the function is there. */
export interface Improved {
  readonly design: Float64Array;
  readonly value: number;
}

const mostIntegers = 20;

/**
 * Improves a design locally: in turn, quasi-Newton steps over all continuous columns and the best change of a single
 * integer or category column, until neither brings anything. Never ends lower than it starts.
 */
export function improveDesign(
  target: Climbable,
  encoding: Encoding,
  design: Float64Array,
  effort: Effort,
  stream: Stream,
): Improved {
  const { columns } = encoding.space;
  const discrete = columns.flatMap((column, j) => (column.kind === 'continuous' ? [] : [j]));
  const continuous = columns.flatMap((column, j) => (column.kind === 'continuous' ? [j] : []));
  let current: Improved = { design: design.slice(), value: valuesAt(target, encoding, [design])[0]! };
  for (let round = 0; round < effort.rounds; round++) {
    const before = current.value;
    if (continuous.length > 0) current = climbContinuous(target, encoding, current, continuous, effort.steps);
    if (discrete.length === 0) break;
    current = changeOneColumn(target, encoding, current, discrete, effort.tries, stream);
    if (!(current.value > before)) break;
  }
  return current;
}

function climbContinuous(
  target: Climbable,
  encoding: Encoding,
  current: Improved,
  continuous: readonly number[],
  steps: number,
): Improved {
  const x = encode(encoding, asMatrix([current.design]));
  const features = continuous.map((j) => encoding.blocks[j]!.offset);
  const at = (point: Float64Array): Matrix => {
    const moved = { ...x, values: x.values.slice() };
    features.forEach((f, k) => {
      moved.values[f] = point[k]!;
    });
    return moved;
  };
  const evaluate = (point: Float64Array) => ({
    value: -target.value(at(point))[0]!,
    gradient: () => {
      const gradient = target.gradient(at(point)).values;
      return Float64Array.from(features, (f) => -gradient[f]!);
    },
  });
  const start = Float64Array.from(features, (f) => x.values[f]!);
  const low = new Float64Array(features.length);
  const high = low.map(() => 1);
  const end = minimizeInBox(evaluate, start, low, high, steps);
  const design = decode(encoding, at(end.point)).values;
  const value = valuesAt(target, encoding, [design])[0]!;
  return value > current.value ? { design, value } : current;
}

function changeOneColumn(
  target: Climbable,
  encoding: Encoding,
  current: Improved,
  discrete: readonly number[],
  tries: number,
  stream: Stream,
): Improved {
  const changes = discrete.flatMap((j) => otherValues(encoding, j, current.design[j]!, stream));
  const tried = sampleWithout(stream, changes.length, tries).map((k) => {
    const { column, value } = changes[k]!;
    const design = current.design.slice();
    design[column] = value;
    return design;
  });
  const values = valuesAt(target, encoding, tried);
  let best = current;
  tried.forEach((design, k) => {
    if (values[k]! > best.value) best = { design, value: values[k]! };
  });
  return best;
}

/** All other values of a column; of a long integer column its neighbours and a few drawn ones. */
function otherValues(
  encoding: Encoding,
  j: number,
  now: number,
  stream: Stream,
): { column: number; value: number }[] {
  const column = encoding.space.columns[j]!;
  const low = column.kind === 'integer' ? column.low : 0;
  const count = countValues(column);
  const values =
    column.kind === 'category' || count <= mostIntegers
      ? Array.from({ length: count }, (_, k) => low + k)
      : [now - 1, now + 1, ...Array.from({ length: mostIntegers - 2 }, () => low + stream.below(count))];
  return values
    .filter((value) => value !== now && value >= low && value < low + count)
    .map((value) => ({ column: j, value }));
}

function valuesAt(target: Climbable, encoding: Encoding, designs: readonly Float64Array[]): Float64Array {
  if (designs.length === 0) return new Float64Array();
  return target.value(encode(encoding, asMatrix(designs)));
}

function asMatrix(designs: readonly Float64Array[]): Designs {
  const matrix = zeros(designs.length, designs[0]!.length);
  designs.forEach((design, i) => {
    rowView(matrix, i).set(design);
  });
  return matrix;
}
