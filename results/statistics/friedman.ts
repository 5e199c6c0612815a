import f from '@stdlib/stats-base-dists-f';
import { checkCount, checkValues } from './check-values.js';
import { midranks, type Ranking } from './midranks.js';

/** How methods rank over tasks, and whether their ranks differ. */
export interface FriedmanTest {
  readonly method: 'friedman-iman-davenport';
  readonly tasks: number;
  readonly methods: number;
  readonly tieCorrected: boolean;
  /** Mean rank of each method over tasks, (methods); 1 is best. */
  readonly meanRanks: readonly number[];
  /** Friedman's statistic, with `methods` − 1 degrees of freedom. */
  readonly chiSquare: number;
  /** Iman & Davenport's statistic; infinite where all tasks agree on all ranks. */
  readonly F: number;
  readonly degreesOfFreedom: readonly [number, number];
  /** Of F; where F is infinite, the exact chance that all tasks agree by accident. */
  readonly p: number;
}

/**
 * Friedman's test that all methods rank alike (Friedman 1937), with the F statistic of Iman & Davenport (1980), which
 * is less conservative; formulas as in Demšar 2006, section 3.2.2. In each task the largest score has rank 1, and
 * equal scores share the mean of their ranks.
 *
 * @param scores one row a task, one score a method in each: (tasks, methods), both at least 2.
 * @param options.tieCorrected whether χ² is divided by 1 − Σ(t³ − t)/(N(k³ − k)) over groups of t equal scores
 * (Conover 1999). False unless given, as printed by Demšar; ties then make the test conservative.
 * @throws RangeError for fewer than two tasks or methods, rows that differ in length, or a score that isn't finite.
 */
export function friedmanTest(
  scores: readonly ArrayLike<number>[],
  options: { readonly tieCorrected?: boolean } = {},
): FriedmanTest {
  const { tieCorrected = false } = options;
  const tasks = scores.length;
  const methods = scores[0]?.length ?? 0;
  checkCount(tasks, 'number of tasks', 2);
  checkCount(methods, 'number of methods', 2);
  const rankings = scores.map((row, t) => {
    if (row.length !== methods)
      throw new RangeError(`task ${t} has ${row.length} scores, expected ${methods}`);
    checkValues(row, `scores of task ${t}`);
    return midranks(Array.from(row, (score) => -score));
  });
  const meanRanks = Array.from(
    { length: methods },
    (_, j) => rankings.reduce((sum, { ranks }) => sum + ranks[j]!, 0) / tasks,
  );
  const chiSquare = friedmanStatistic(meanRanks, tasks) / (tieCorrected ? tieFactor(rankings, methods) : 1);
  const degreesOfFreedom = [methods - 1, (methods - 1) * (tasks - 1)] as const;
  const remaining = tasks * (methods - 1) - chiSquare;
  const agreed = remaining <= 1e-9 * tasks * methods;
  const F = agreed ? Infinity : ((tasks - 1) * chiSquare) / remaining;
  const p = agreed ? chanceOfAgreement(rankings[0]!, methods, tasks) : upperTail(F, degreesOfFreedom);
  return {
    method: 'friedman-iman-davenport',
    tasks,
    methods,
    tieCorrected,
    meanRanks,
    chiSquare,
    F,
    degreesOfFreedom,
    p,
  };
}

/** 12N / (k(k + 1)) · (Σ R² − k(k + 1)²/4), written with deviations of the mean ranks R from (k + 1)/2. */
function friedmanStatistic(meanRanks: readonly number[], tasks: number): number {
  const methods = meanRanks.length;
  const squares = meanRanks.reduce((sum, rank) => sum + (rank - (methods + 1) / 2) ** 2, 0);
  return ((12 * tasks) / (methods * (methods + 1))) * squares;
}

/** 1 − Σ(t³ − t)/(N(k³ − k)); 1 where all scores of all tasks are tied, for χ² is 0 then. */
function tieFactor(rankings: readonly Ranking[], methods: number): number {
  const excess = rankings
    .flatMap(({ tieSizes }) => tieSizes)
    .reduce((sum, size) => sum + size ** 3 - size, 0);
  const possible = rankings.length * (methods ** 3 - methods);
  return excess < possible ? 1 - excess / possible : 1;
}

/** P(F > x) as the lower tail of 1/F, whose degrees of freedom are swapped, so that small values keep their digits. */
function upperTail(x: number, [numerator, denominator]: readonly [number, number]): number {
  return x > 0 ? f.cdf(1 / x, denominator, numerator) : 1;
}

/** All tasks after the first repeat its ranking, one of k!/Πt! equally likely ones. */
function chanceOfAgreement({ tieSizes }: Ranking, methods: number, tasks: number): number {
  const arrangements = tieSizes.reduce((count, size) => count / factorial(size), factorial(methods));
  return arrangements ** -(tasks - 1);
}

function factorial(n: number): number {
  let product = 1;
  for (let i = 2; i <= n; i++) product *= i;
  return product;
}
