/** Chance that a sound generator fails one of these checks, were its seed drawn afresh; the seeds are fixed. */
export const falseAlarm = 1e-6;

/** Upper 1e-6 points of the chi-square distribution by degrees of freedom: scipy 1.17.1, `chi2.isf(1e-6, df)`. */
const criticalValues: Readonly<Record<number, number>> = {
  2: 27.631021115928547,
  5: 35.888186879672865,
  7: 40.521831234179864,
  9: 44.81093787068782,
  11: 48.86564276320364,
  19: 63.677052285677995,
  23: 70.54955713688595,
  99: 180.79201532589974,
};

/** Two-sided 1e-6 point of the standard normal distribution: scipy 1.17.1, `norm.isf(5e-7)`. */
export const criticalDeviation = 4.891638475698591;

/**
 * How far counts lie from the expected shares (equal ones by default), as Pearson's statistic over its critical value
 * at `falseAlarm`: above 1 means that they don't fit.
 */
export function misfit(counts: readonly number[], shares?: readonly number[]): number {
  const total = counts.reduce((sum, count) => sum + count, 0);
  const statistic = counts.reduce((sum, count, i) => {
    const expected = total * (shares?.[i] ?? 1 / counts.length);
    return sum + (count - expected) ** 2 / expected;
  }, 0);
  const critical = criticalValues[counts.length - 1];
  if (critical === undefined) throw new RangeError(`no critical value for ${counts.length} cells`);
  return statistic / critical;
}

/** How often each of 0 … cells − 1 is drawn. */
export function tally(cells: number, draws: number, draw: () => number): number[] {
  const counts = new Array<number>(cells).fill(0);
  for (let i = 0; i < draws; i++) {
    const cell = draw();
    counts[cell] = counts[cell]! + 1;
  }
  return counts;
}
