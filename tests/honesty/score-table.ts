import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { packageRoot } from '../../cli/package-root.js';
import type { CellRow } from '../../harness/row.js';

/** The scores that the studies draw from. */
export const scoresFile: string = join(packageRoot, 'tests', 'honesty', 'scores.csv');

/** Scores are kept to so many decimals. */
const decimals = 5;

/** One task behind its curtain: for each method its scores by stream and seed. */
export interface TaskScores {
  readonly task: string;
  /** Seeds 1 … n. */
  readonly seeds: number;
  /** By method label: one array a stream of random numbers, (streams, seeds). */
  readonly methods: ReadonlyMap<string, readonly Float64Array[]>;
}

/** Best scores of several rehearsals, which differ in their methods' random numbers, as a compact CSV. */
export function renderScores(streams: readonly (readonly CellRow[])[]): string {
  const cells = new Map<string, number>();
  const columns = new Set<string>();
  const places = new Map<string, { readonly task: string; readonly seed: number }>();
  streams.forEach((rows, stream) => {
    for (const { task, seed, method, best } of rows) {
      const column = `${method}#${stream + 1}`;
      columns.add(column);
      places.set(`${task},${seed}`, { task, seed });
      cells.set(`${task},${seed},${column}`, best);
    }
  });
  const tasks = [...new Set([...places.values()].map(({ task }) => task))].sort();
  const order = [...columns].sort(byMethodAndStream);
  const lines = [...places.values()]
    .sort((a, b) => tasks.indexOf(a.task) - tasks.indexOf(b.task) || a.seed - b.seed)
    .map(({ task, seed }) => {
      const scores = order.map((column) => cells.get(`${task},${seed},${column}`)!.toFixed(decimals));
      return [task, seed, ...scores].join();
    });
  return `${[['task', 'seed', ...order].join(), ...lines].join('\n')}\n`;
}

function byMethodAndStream(a: string, b: string): number {
  const [[one = '', first], [other = '', second]] = [a.split('#'), b.split('#')];
  if (one !== other) return one < other ? -1 : 1;
  return Number(first) - Number(second);
}

/** Reads the CSV of `renderScores`, which quotes nothing. */
export function parseScores(text: string): TaskScores[] {
  const [header = '', ...lines] = text.trimEnd().split('\n');
  const columns = header.split(',').slice(2);
  const tasks = new Map<string, number[][]>();
  for (const line of lines) {
    const [task = '', , ...scores] = line.split(',');
    tasks.set(task, [...(tasks.get(task) ?? []), scores.map(Number)]);
  }
  return [...tasks].map(([task, rows]) => {
    const methods = new Map<string, Float64Array[]>();
    columns.forEach((column, k) => {
      const [method = ''] = column.split('#');
      const scores = Float64Array.from(rows, (row) => row[k]!);
      methods.set(method, [...(methods.get(method) ?? []), scores]);
    });
    return { task, seeds: rows.length, methods };
  });
}

/** The committed scores. */
export function readScores(): TaskScores[] {
  return parseScores(readFileSync(scoresFile, 'utf8'));
}
