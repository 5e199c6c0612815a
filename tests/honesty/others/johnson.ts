import t from '@stdlib/stats-base-dists-t';
import { moments } from '../../../results/statistics/moments.js';

/** Interval of a mean from Johnson's modified t (Johnson 1978): Student's, moved by μ₃ / (6 s² n). */
export function johnsonInterval(values: readonly number[]): { readonly low: number; readonly high: number } {
  const { n, mean, standardDeviation, standardError } = moments(values);
  const cubes = values.reduce((sum, value) => sum + (value - mean) ** 3, 0);
  const third = (cubes * n) / ((n - 1) * (n - 2));
  const centre = mean + third / (6 * standardDeviation! ** 2 * n);
  const reach = t.quantile(0.975, n - 1) * standardError!;
  return { low: centre - reach, high: centre + reach };
}
