import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type Box, cornerOf, input, type Response, responseTask, subBoxSetting } from './response.js';

/** Which input is the spring coefficient, the only one that may be best at either end. */
const spring = 3;

/**
 * Time of one cycle of a piston, s (Kenett & Zacks 1998; Ben-Ari & Steinberg 2007):
 *
 * C = 2π √(M / (k + S² P_0 V_0 T_a / (T_0 V²))), V = S/(2k) (√(A² + 4k P_0 V_0 T_a/T_0) − A),
 * A = P_0 S + 19.62 M − k V_0/S.
 *
 * C is not monotone in every input over the published ranges, but over any box inside them that reaches into the outer
 * 15 % of each range at both its ends, as every instance does, C is least at a corner. Write c = P_0 V_0 T_a/T_0, s = V/S (the positive root of
 * k s² + A s = c), Q = c/s² = k + A/s, D = k + Q and R = 2ks + A = √(A² + 4kc), so that C = 2π √(M/D). All but A are
 * positive, ∂Q/∂A = 2Q/R > 0 and ∂Q/∂c = −A/(s² R). Take the inputs one after another:
 *
 * 1. S: only A depends on it, and rises. D rises, whatever the others are: S high.
 * 2. V_0: ∂Q/∂V_0 = −Q/(R V_0) (P_0 S + 19.62 M + k V_0/S) < 0, whatever the others are: V_0 low.
 * 3. P_0: ∂Q/∂P_0 = Q/(R P_0) (P_0 S − 19.62 M + k V_0/S). With S high, at least 0.01775, P_0 S ≥ 1597 and
 *    19.62 M ≤ 1178, so D rises: P_0 high.
 * 4. T_a and T_0: with these at their ends P_0 S ≥ 107 000 · 0.01775 > 1899 and k V_0/S ≤ 5000 · 0.0032/0.01775 < 902,
 *    so A > 0 and D falls with c: T_a low, T_0 high.
 * 5. M: C falls only where R D < 39.24 M Q, hence only where R = P_0 S + 19.62 M + k (V_0/S) (2σ − 1) < 39.24 M,
 *    with σ = s S/V_0. From the equation of s, σ ≥ P_0 S (T_a/T_0) / (P_0 S + 19.62 M) > 0.49, so the last term of R is
 *    above −902 · 0.02, and P_0 S − 19.62 M > 721 outweighs it: C rises, M low.
 * 6. k: ∂D/∂k has the sign of 3 + k s²/c − 2/σ. σ < 1, σ rises with k, and so does k s²/c; so D first falls and then
 *    rises, or does only one of them: k at one of its ends, whichever gives the shorter time.
 */
export const pistonResponse: Response = {
  box: [
    input('piston_weight', 30, 60, 'kg'),
    input('piston_area', 0.005, 0.02, 'm2'),
    input('initial_gas_volume', 0.002, 0.01, 'm3'),
    input('spring_coefficient', 1000, 5000, 'N/m'),
    input('atmospheric_pressure', 90_000, 110_000, 'N/m2'),
    input('ambient_temperature', 290, 296, 'K'),
    input('gas_temperature', 340, 360, 'K'),
  ],
  aim: 'smallest',
  formula(m, s, v0, k, p0, ta, t0) {
    const a = p0 * s + 19.62 * m - (k * v0) / s;
    const gas = ((p0 * v0) / t0) * ta;
    const volume = (s / (2 * k)) * (Math.sqrt(a * a + 4 * k * gas) - a);
    return 2 * Math.PI * Math.sqrt(m / (k + (s * s * gas) / (volume * volume)));
  },
  best(box) {
    const soft = bestCorner(box, 'low');
    const stiff = bestCorner(box, 'high');
    return pistonResponse.formula(...soft) < pistonResponse.formula(...stiff) ? soft : stiff;
  },
};

function bestCorner(box: Box, springEnd: 'low' | 'high'): Float64Array {
  const corner = cornerOf(box, ['low', 'high', 'low', 'low', 'high', 'low', 'high']);
  corner[spring] = box[spring]![springEnd];
  return corner;
}

/** The piston: as short a cycle as possible. */
export const piston = defineTaskFamily({
  name: 'piston',
  description: 'Cycle time of a piston in s, negated, 7 columns: to be made as short as possible',
  source: 'Kenett & Zacks 1998; Ben-Ari & Steinberg 2007',
  settings: z.strictObject({ moved: subBoxSetting }),
  make: ({ moved }, stream) => responseTask(pistonResponse, moved, stream),
});
