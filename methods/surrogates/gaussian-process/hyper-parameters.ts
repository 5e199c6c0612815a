/** What shapes a Gaussian process, in units of standardized scores and of encoded rows. */
export interface HyperParameters {
  /** One length scale a group of the kernel's layout, in encoded units: a scaled column spans 1. */
  readonly lengthScales: Float64Array;
  /** Prior variance of the latent function. */
  readonly amplitude: number;
  /** Variance of the measurement noise. */
  readonly noise: number;
}

/** As one vector of logarithms: length scales, then amplitude, then noise. */
export function toLogarithms({ lengthScales, amplitude, noise }: HyperParameters): Float64Array {
  return Float64Array.of(...Array.from(lengthScales, Math.log), Math.log(amplitude), Math.log(noise));
}

/** The inverse of `toLogarithms`. */
export function fromLogarithms(logarithms: Float64Array): HyperParameters {
  const groups = logarithms.length - 2;
  return {
    lengthScales: logarithms.slice(0, groups).map(Math.exp),
    amplitude: Math.exp(logarithms[groups]!),
    noise: Math.exp(logarithms[groups + 1]!),
  };
}
