import type { Stream } from '../../../harness/random.js';
import { moments } from '../../../results/statistics/moments.js';
import { quantileSorted } from '../../../results/statistics/quantile.js';

/**
 * Bootstrap-t interval of a mean (Efron & Tibshirani 1993, chapter 12): quantiles of (mean* − mean) / deviation* take the
 * place of Student's. A resample of equal values lies far out on its side.
 */
export function bootstrapTInterval(
  values: readonly number[],
  { resamples, stream }: { readonly resamples: number; readonly stream: Stream },
): { readonly low: number; readonly high: number } {
  const { n, mean, standardDeviation } = moments(values);
  const centred = values.map((value) => value - mean);
  const studentized = new Float64Array(resamples);
  for (let b = 0; b < resamples; b++) {
    let [sum, squares] = [0, 0];
    for (let i = 0; i < n; i++) {
      const value = centred[Math.floor(stream.uniform() * n)]!;
      sum += value;
      squares += value ** 2;
    }
    const variance = (squares - sum ** 2 / n) / (n - 1);
    const flat = variance <= 1e-20 * standardDeviation! ** 2;
    studentized[b] = flat ? Math.sign(sum) * 1e6 : sum / n / Math.sqrt(variance);
  }
  studentized.sort();
  const bound = (probability: number) => mean - quantileSorted(studentized, probability) * standardDeviation!;
  return { low: bound(0.975), high: bound(0.025) };
}
