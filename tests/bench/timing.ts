/** Median of an odd number of runs of `work`, in milliseconds each, after one run to warm up. */
export async function medianMilliseconds(runs: number, work: () => unknown): Promise<number> {
  await work();
  const times: number[] = [];
  for (let run = 0; run < runs; run++) {
    const start = performance.now();
    await work();
    times.push(performance.now() - start);
  }
  return times.sort((a, b) => a - b)[Math.floor(runs / 2)]!;
}

/** A line of the report: what was timed, the figure, and a ratio, if not said otherwise to the first of its group. */
export function report(
  what: string,
  figure: number,
  unit: string,
  ratio?: number,
  ratioUnit = 'x the first',
): void {
  const compared = ratio === undefined ? '' : `   ${ratio.toFixed(2)} ${ratioUnit}`;
  process.stdout.write(`${what.padEnd(52)} ${figure.toPrecision(3).padStart(8)} ${unit}${compared}\n`);
}
