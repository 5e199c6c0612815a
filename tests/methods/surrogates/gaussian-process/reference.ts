import { readFileSync } from 'node:fs';
import { type Matrix, matrixFromRows } from '../../../../harness/designs.js';
import { makeEncoding } from '../../../../harness/encoding.js';
import { makeSpace } from '../../../../harness/space.js';
import {
  type KernelLayout,
  makeKernelLayout,
} from '../../../../methods/surrogates/gaussian-process/kernel-layout.js';
import { GaussianPosterior } from '../../../../methods/surrogates/gaussian-process/posterior.js';

interface GaussianProcessReference {
  readonly X: number[][];
  readonly y: number[];
  readonly X_test: number[][];
  readonly amp2: number;
  readonly length_scales: number[];
  readonly noise_variance: number;
  readonly matern52_ard: {
    readonly posterior_mean: number[];
    readonly posterior_std_latent: number[];
    readonly posterior_cov_latent_0_1: number;
    readonly log_marginal_likelihood: number;
    readonly K_row0_without_noise: number[];
  };
}

/** Computed with scikit-learn 1.2.1; see the file's `source` fields. */
export const reference = (
  JSON.parse(readFileSync(new URL('../../../reference/models.json', import.meta.url), 'utf8')) as {
    gaussian_process: GaussianProcessReference;
  }
).gaussian_process;

export const hyperParameters = {
  lengthScales: Float64Array.from(reference.length_scales),
  amplitude: reference.amp2,
  noise: reference.noise_variance,
};
export const x: Matrix = matrixFromRows(reference.X);
export const targets = Float64Array.from(reference.y);
export const xTest: Matrix = matrixFromRows(reference.X_test);

export const layout: KernelLayout = makeKernelLayout(
  makeEncoding(makeSpace(['a', 'b'].map((name) => ({ kind: 'continuous' as const, name, low: 0, high: 1 })))),
  50,
);

export function referencePosterior(room = 0, noise = hyperParameters.noise): GaussianPosterior {
  return new GaussianPosterior(layout, { ...hyperParameters, noise }, x, targets, room);
}
