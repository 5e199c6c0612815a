import { clearInputs, enterRows } from './inputs';
import { members, mostRows, parametersOf, shape, slope, work } from './networks';
import { forward } from './passes';
import { fours } from './shape';
import { features } from './space';
import { outputsAt } from './workspace';

/** Outputs of every member (f32, member by member) for `count` encoded rows (f64, row-major). */
export function predict(x: usize, count: i32, outputs: usize): void {
  for (let start = 0; start < count; start += mostRows) {
    const some = min(mostRows, count - start);
    const rows = fours(some);
    clearInputs(rows);
    enterRows(x + ((<usize>start * <usize>features) << 3), some, rows, 0);
    for (let m = 0; m < members; m++) {
      forward(shape, parametersOf(m), work, rows, slope);
      const to = outputs + ((<usize>m * <usize>count + <usize>start) << 2);
      memory.copy(to, outputsAt(shape, work, rows), (<usize>some) << 2);
    }
  }
}
