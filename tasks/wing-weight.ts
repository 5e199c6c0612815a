import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { type Box, cornerOf, input, type Response, responseTask, subBoxSetting } from './response.js';

/** Which input is the sweep angle, the only one that is not best at an end. */
const sweep = 3;

/**
 * Weight of a light aircraft's wing, lb (Forrester, Sóbester & Keane 2008):
 *
 * 0.036 S_w^0.758 W_fw^0.0035 (A/cos²Λ)^0.6 q^0.006 λ^0.04 (100 t_c/cos Λ)^−0.3 (N_z W_dg)^0.49 + S_w W_p.
 *
 * All inputs but Λ are positive and each enters by a power, or S_w W_p, alone: the weight falls with the thickness
 * ratio t_c and rises with all the others. Λ enters as (cos Λ)^−0.9, even and rising with |Λ| within ±90°, so the
 * lightest wing has the sweep nearest to 0 that the box allows.
 */
export const wingWeightResponse: Response = {
  box: [
    input('wing_area', 150, 200, 'ft2'),
    input('fuel_weight', 220, 300, 'lb'),
    input('aspect_ratio', 6, 10),
    input('sweep_angle', -10, 10, 'deg'),
    input('dynamic_pressure', 16, 45, 'lb/ft2'),
    input('taper_ratio', 0.5, 1),
    input('thickness_to_chord', 0.08, 0.18),
    input('ultimate_load_factor', 2.5, 6),
    input('gross_weight', 1700, 2500, 'lb'),
    input('paint_weight', 0.025, 0.08, 'lb/ft2'),
  ],
  aim: 'smallest',
  formula(sw, wfw, a, degrees, q, lambda, tc, nz, wdg, wp) {
    const cosine = Math.cos((degrees * Math.PI) / 180);
    const shape = (a / cosine ** 2) ** 0.6 * lambda ** 0.04 * ((100 * tc) / cosine) ** -0.3;
    return 0.036 * sw ** 0.758 * wfw ** 0.0035 * q ** 0.006 * shape * (nz * wdg) ** 0.49 + sw * wp;
  },
  best,
};

function best(box: Box): Float64Array {
  const lightest = cornerOf(box, ['low', 'low', 'low', 'low', 'low', 'low', 'high', 'low', 'low', 'low']);
  lightest[sweep] = Math.min(box[sweep]!.high, Math.max(box[sweep]!.low, 0));
  return lightest;
}

/** The wing: as light as possible. */
export const wingWeight = defineTaskFamily({
  name: 'wing-weight',
  description: 'Weight of an aircraft wing in lb, negated, 10 columns: to be made as light as possible',
  source: 'Forrester, Sóbester & Keane 2008',
  settings: z.strictObject({ moved: subBoxSetting }),
  make: ({ moved }, stream) => responseTask(wingWeightResponse, moved, stream),
});
