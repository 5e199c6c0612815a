import { checkCount, checkShare } from './check-values.js';
import { studentizedRangeQuantile } from './studentized-range.js';

/** By how much mean ranks must differ. */
export interface NemenyiDifference {
  readonly method: 'nemenyi';
  readonly methods: number;
  readonly tasks: number;
  readonly alpha: number;
  /** Upper alpha point of the studentized range at infinite degrees of freedom, divided by √2. */
  readonly q: number;
  /** Two methods differ when their mean ranks lie at least this far apart. */
  readonly criticalDifference: number;
}

/**
 * Nemenyi's critical difference of mean ranks, q √(k(k + 1)/(6N)), for all pairs among k methods over N tasks
 * (Nemenyi 1963; Demšar 2006, section 3.2.2).
 *
 * @param options.alpha chance of any false difference among all pairs; 0.05 unless given.
 * @throws RangeError for fewer than two methods, no task, or alpha outside (0, 1).
 */
export function nemenyiDifference(options: {
  readonly methods: number;
  readonly tasks: number;
  readonly alpha?: number;
}): NemenyiDifference {
  const { methods, tasks, alpha = 0.05 } = options;
  checkCount(methods, 'number of methods', 2);
  checkCount(tasks, 'number of tasks');
  checkShare(alpha, 'alpha');
  const q = studentizedRangeQuantile(1 - alpha, methods) / Math.SQRT2;
  const criticalDifference = q * Math.sqrt((methods * (methods + 1)) / (6 * tasks));
  return { method: 'nemenyi', methods, tasks, alpha, q, criticalDifference };
}

/**
 * The largest groups of methods that can't be told apart: all members' mean ranks lie within less than the critical
 * difference of each other. These are the bars of a critical-difference diagram (Demšar 2006).
 *
 * @param meanRanks (methods).
 * @returns groups of two and more positions in `meanRanks`, each from the best rank on; groups may overlap.
 */
export function nemenyiGroups(meanRanks: readonly number[], criticalDifference: number): number[][] {
  const order = meanRanks.map((_, i) => i).sort((a, b) => meanRanks[a]! - meanRanks[b]!);
  const groups: number[][] = [];
  let reached = 0;
  order.forEach((first, start) => {
    let end = start + 1;
    while (end < order.length && meanRanks[order[end]!]! - meanRanks[first]! < criticalDifference) end++;
    if (end - start > 1 && end > reached) groups.push(order.slice(start, end));
    reached = Math.max(reached, end);
  });
  return groups;
}
