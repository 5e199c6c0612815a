/** A function's value at one place, and its gradient for whoever needs it. */
export interface Evaluated {
  readonly value: number;
  gradient(): Float64Array;
}

/** Where a minimization ended. */
export interface Minimum {
  readonly point: Float64Array;
  readonly value: number;
  readonly iterations: number;
}

const memory = 8;
const sufficientDecrease = 1e-4;

/**
 * Minimizes a smooth function in a box by limited-memory quasi-Newton steps (Nocedal & Wright 2006, algorithm 7.4)
 * over the variables that no bound holds, projected onto the box and halved until they bring a sufficient decrease
 * along the projection (Bertsekas 1982). A local method: it ends where the projected gradient or the progress is
 * below 10⁻⁶ of the value's size, or after `iterations` steps. The end is never worse than the start.
 *
 * @param evaluate may return a value that is not finite where the function is not defined, except at the start
 * @param start (d), is moved into the box first
 */
export function minimizeInBox(
  evaluate: (point: Float64Array) => Evaluated,
  start: Float64Array,
  low: Float64Array,
  high: Float64Array,
  iterations: number,
): Minimum {
  const clip = (value: number, j: number) => Math.min(high[j]!, Math.max(low[j]!, value));
  let point: Float64Array = start.map(clip);
  let current = evaluate(point);
  let gradient = current.gradient();
  const history: { step: Float64Array; change: Float64Array }[] = [];
  let done = 0;
  while (done < iterations && Number.isFinite(current.value)) {
    const tolerance = 1e-6 * Math.max(1, Math.abs(current.value));
    const free = gradient.map((g, j) =>
      (g > 0 && point[j]! <= low[j]!) || (g < 0 && point[j]! >= high[j]!) ? 0 : 1,
    );
    const steepest = gradient.map((g, j) => (free[j] ? -g : 0));
    if (largest(steepest) < tolerance) break;
    let direction = quasiNewton(steepest, history, free);
    if (!(product(direction, gradient) < 0)) {
      history.length = 0;
      direction = quasiNewton(steepest, history, free);
    }
    const next = lineSearch(direction);
    if (next === undefined) {
      if (history.length === 0) break;
      history.length = 0;
      continue;
    }
    done++;
    const nextGradient = next.evaluated.gradient();
    const step = next.point.map((value, j) => value - point[j]!);
    const change = nextGradient.map((value, j) => value - gradient[j]!);
    if (product(step, change) > 1e-10 * product(change, change)) {
      history.push({ step, change });
      if (history.length > memory) history.shift();
    }
    const progress = current.value - next.evaluated.value;
    point = next.point;
    current = next.evaluated;
    gradient = nextGradient;
    if (progress < tolerance) break;
  }
  return { point, value: current.value, iterations: done };

  function lineSearch(direction: Float64Array): { point: Float64Array; evaluated: Evaluated } | undefined {
    for (let size = 1; size > 1e-8; size /= 2) {
      const candidate = point.map((value, j) => clip(value + size * direction[j]!, j));
      const expected = candidate.reduce((sum, value, j) => sum + (value - point[j]!) * gradient[j]!, 0);
      if (!(expected < 0)) return undefined;
      const evaluated = evaluate(candidate);
      if (evaluated.value <= current.value + sufficientDecrease * expected)
        return { point: candidate, evaluated };
    }
    return undefined;
  }
}

function quasiNewton(
  steepest: Float64Array,
  history: readonly { step: Float64Array; change: Float64Array }[],
  free: Float64Array,
): Float64Array {
  const direction = steepest.slice();
  if (history.length === 0) {
    const size = Math.min(1, 1 / Math.max(largest(steepest), 1e-300));
    return direction.map((value) => value * size);
  }
  const along = history.map(() => 0);
  for (let k = history.length - 1; k >= 0; k--) {
    const { step, change } = history[k]!;
    along[k] = product(step, direction) / product(step, change);
    for (let j = 0; j < direction.length; j++) direction[j]! -= along[k]! * change[j]!;
  }
  const last = history[history.length - 1]!;
  const scale = product(last.step, last.change) / product(last.change, last.change);
  for (let j = 0; j < direction.length; j++) direction[j]! *= scale;
  for (let k = 0; k < history.length; k++) {
    const { step, change } = history[k]!;
    const back = product(change, direction) / product(step, change);
    for (let j = 0; j < direction.length; j++) direction[j]! += (along[k]! - back) * step[j]!;
  }
  return direction.map((value, j) => (free[j] ? value : 0));
}

function product(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < a.length; j++) sum += a[j]! * b[j]!;
  return sum;
}

function largest(a: Float64Array): number {
  let most = 0;
  for (const value of a) most = Math.max(most, Math.abs(value));
  return most;
}
