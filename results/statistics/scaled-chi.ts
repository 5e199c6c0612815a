/** Points of the trapezoidal rule. */
const points = 800;

/**
 * Expectation of g(S) where S = √(χ²/ν), the ratio of a sample's standard deviation to the true one with ν degrees of
 * freedom. The density of log S is proportional to exp(ν(u − e^{2u}/2)); the trapezoidal rule over u, with weights
 * that sum to 1, needs no gamma function and is exact to about 1e-10 for smooth g bounded by 1.
 *
 * @param degreesOfFreedom ν, at least 1.
 */
export function expectScaledChi(degreesOfFreedom: number, g: (scale: number) => number): number {
  const reach = 10 / Math.sqrt(degreesOfFreedom);
  const from = -Math.max(45 / degreesOfFreedom, reach);
  const to = Math.min(reach, 2.5);
  let sum = 0;
  let total = 0;
  for (let k = 0; k <= points; k++) {
    const u = from + ((to - from) * k) / points;
    const scale = Math.exp(u);
    const weight = Math.exp(degreesOfFreedom * (u - scale ** 2 / 2 + 0.5));
    sum += weight * g(scale);
    total += weight;
  }
  return sum / total;
}
