import { type Matrix, rowView, zeros } from '../../../harness/designs.js';
import type { Stream } from '../../../harness/random.js';
import { dot } from '../cholesky.js';
import type { KernelLayout } from './kernel-layout.js';
import type { GaussianPosterior } from './posterior.js';
import { RowProduct } from './row-product.js';

/** Functions drawn from a posterior: each can be evaluated anywhere, again and again, and has a gradient. */
export interface SampleFunctions {
  readonly count: number;
  /** All functions at encoded rows, (m, width) to (m, count). */
  values(x: Matrix): Matrix;
  /** Function `k` at encoded rows, (m). */
  value(k: number, x: Matrix): Float64Array;
  /** Gradient of function `k`, (m, width). */
  gradient(k: number, x: Matrix): Matrix;
}

/** Most numbers held for frequencies: in a very wide space there are fewer frequencies than asked for. */
const mostNumbers = 1_000_000;

/**
 * Draws functions from a posterior by pathwise conditioning (Wilson et al. 2020, eq. 12): a prior function made of
 * random Fourier features (Rahimi & Recht 2007; the spectral density of Matérn-5/2 is a multivariate t with 5 degrees
 * of freedom, Rasmussen & Williams 2006, eq. 4.15), corrected by the kernel so that it agrees with the targets.
 *
 * The functions share their frequencies; over fresh frequencies mean and covariance are exactly those of the posterior.
 *
 * @param frequencies how many, each giving a cosine and a sine feature
 */
export function drawFunctions(
  posterior: GaussianPosterior,
  count: number,
  frequencies: number,
  stream: Stream,
): SampleFunctions {
  const { rows, hyperParameters } = posterior;
  const { layout } = rows;
  const n = rows.size;
  const drawn = Math.max(1, Math.min(frequencies, Math.floor(mostNumbers / layout.width)));
  const omega = drawFrequencies(layout, hyperParameters.lengthScales, drawn, stream.split('frequencies'));
  const height = Math.sqrt(hyperParameters.amplitude / drawn);
  const features = 2 * drawn;
  const weights = zeros(count, features);
  const updates = zeros(count, n);
  const projection = new RowProduct(omega, layout.width, drawn);
  const angles = new Float64Array(drawn);
  const turns = new Float64Array(drawn);
  const waves = new Float64Array(features);

  const atTable = zeros(n, features);
  for (let i = 0; i < n; i++) rowView(atTable, i).set(fillWaves(rows.row(i)));
  for (let k = 0; k < count; k++) {
    const draw = stream.split('function', k);
    const w = rowView(weights, k);
    for (let f = 0; f < features; f++) w[f] = height * draw.normal();
    const residual = new Float64Array(n);
    for (let i = 0; i < n; i++) {
      const prior = dot(w, 0, atTable.values, i * features, features);
      residual[i] = posterior.targets[i]! - prior - Math.sqrt(hyperParameters.noise) * draw.normal();
    }
    rowView(updates, k).set(posterior.solve(residual));
  }

  return {
    count,
    values(x) {
      const values = zeros(x.rows, count);
      for (let i = 0; i < x.rows; i++) {
        fillWaves(rowView(x, i));
        const kernels = posterior.kernels(rowView(x, i));
        for (let k = 0; k < count; k++) values.values[i * count + k] = combine(k, kernels);
      }
      return values;
    },
    value(k, x) {
      return Float64Array.from({ length: x.rows }, (_, i) => {
        fillWaves(rowView(x, i));
        return combine(k, posterior.kernels(rowView(x, i)));
      });
    },
    gradient(k, x) {
      const gradient = zeros(x.rows, x.columns);
      const w = rowView(weights, k);
      for (let i = 0; i < x.rows; i++) {
        fillWaves(rowView(x, i));
        const into = rowView(gradient, i);
        for (let f = 0; f < drawn; f++) {
          turns[f] = w[2 * f + 1]! * waves[2 * f]! - w[2 * f]! * waves[2 * f + 1]!;
        }
        for (let j = 0; j < layout.width; j++) into[j] = dot(turns, 0, omega, j * drawn, drawn);
        posterior.addKernelGradient(rowView(x, i), rowView(updates, k), into);
      }
      return gradient;
    },
  };

  function combine(k: number, kernels: Float64Array): number {
    return dot(weights.values, k * features, waves, 0, features) + dot(updates.values, k * n, kernels, 0, n);
  }

  function fillWaves(row: Float64Array): Float64Array {
    projection.multiply(row, drawn, angles);
    for (let f = 0; f < drawn; f++) {
      waves[2 * f] = Math.cos(angles[f]!);
      waves[2 * f + 1] = Math.sin(angles[f]!);
    }
    return waves;
  }
}

/** (width, count): each frequency, a column, is a normal vector over the length scales, divided by √(χ²₅ / 5). */
function drawFrequencies(
  layout: KernelLayout,
  lengthScales: Float64Array,
  count: number,
  stream: Stream,
): Float64Array {
  const omega = new Float64Array(count * layout.width);
  for (let f = 0; f < count; f++) {
    let chiSquare = 0;
    for (let k = 0; k < 5; k++) chiSquare += stream.normal() ** 2;
    const stretch = Math.sqrt(5 / chiSquare);
    for (let j = 0; j < layout.width; j++) {
      omega[j * count + f] = (stretch * stream.normal()) / lengthScales[layout.groupOf[j]!]!;
    }
  }
  return omega;
}
