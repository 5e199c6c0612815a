/** The strategy parameters of CMA-ES for n dimensions; fixed for a run. Names as in the tutorial. */
export interface CmaEsParameters {
  /** λ, designs a generation. */
  readonly population: number;
  /** μ, designs that the next mean is made of. */
  readonly parents: number;
  /** w, (μ): positive, decreasing, with sum 1. */
  readonly weights: Float64Array;
  /** μ_eff, between 1 and μ. */
  readonly effectiveParents: number;
  readonly cSigma: number;
  readonly dSigma: number;
  readonly cC: number;
  readonly c1: number;
  readonly cMu: number;
  /** χ_n, the expected length of a standard normal vector, by the tutorial's approximation. */
  readonly expectedNorm: number;
}

/** Which entries of the covariance matrix are learned. */
export type CovarianceShape = 'full' | 'diagonal';

/**
 * The default parameters of Hansen 2016 (arXiv:1604.00772, table 1 and equations 49–58) for maximization or
 * minimization in `dimensions` ≥ 1 dimensions, with positive weights only (w_i = 0 for i > μ) and the 2016 variant of
 * c_μ, whose numerator is μ_eff − 2 + 1/μ_eff (without the 1/4 of the 2023 revision).
 *
 * With a diagonal covariance the two learning rates are (n + 2)/3 times as large (Ros & Hansen 2008, whose factor is
 * applied here to the 2016 rates), and still sum to at most 1.
 *
 * @param population λ; by default 4 + ⌊3 ln n⌋. A whole number of at least 2.
 */
export function cmaEsParameters(
  dimensions: number,
  { population = 4 + Math.floor(3 * Math.log(dimensions)), shape = 'full' as CovarianceShape } = {},
): CmaEsParameters {
  const n = dimensions;
  const parents = Math.floor(population / 2);
  const raw = Float64Array.from(
    { length: parents },
    (_, i) => Math.log((population + 1) / 2) - Math.log(i + 1),
  );
  const sum = raw.reduce((total, w) => total + w, 0);
  const weights = raw.map((w) => w / sum);
  const muEff = 1 / weights.reduce((total, w) => total + w * w, 0);
  const cSigma = (muEff + 2) / (n + muEff + 5);
  const speedUp = shape === 'diagonal' ? (n + 2) / 3 : 1;
  const c1 = Math.min(1, (speedUp * 2) / ((n + 1.3) ** 2 + muEff));
  return {
    population,
    parents,
    weights,
    effectiveParents: muEff,
    cSigma,
    dSigma: 1 + 2 * Math.max(0, Math.sqrt((muEff - 1) / (n + 1)) - 1) + cSigma,
    cC: (4 + muEff / n) / (n + 4 + (2 * muEff) / n),
    c1,
    cMu: Math.min(1 - c1, (speedUp * 2 * (muEff - 2 + 1 / muEff)) / ((n + 2) ** 2 + muEff)),
    expectedNorm: Math.sqrt(n) * (1 - 1 / (4 * n) + 1 / (21 * n * n)),
  };
}
