import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { cornerOf, input, type Response, responseTask, subBoxSetting } from './response.js';

/**
 * Midpoint voltage of an output-transformerless push-pull circuit, V (Ben-Ari & Steinberg 2007). With
 * g = β (R_c2 + 9), V_b1 = 12 R_b2 / (R_b1 + R_b2):
 *
 * V_m = (V_b1 + 0.74) g / (g + R_f) + 11.35 R_f / (g + R_f) + 0.74 R_f g / ((g + R_f) R_c1).
 *
 * V_b1, and so V_m, falls with R_b1 and rises with R_b2; V_m falls with R_c1. Its derivatives are
 * g (10.61 − V_b1 + 0.74 g/R_c1) / (g + R_f)² by R_f and R_f (V_b1 − 10.61 + 0.74 R_f/R_c1) / (g + R_f)² by g. On the
 * published ranges V_b1 ≤ 7 and 0.74 R_f/R_c1 ≤ 1.85, so the first is positive and the second negative: V_m rises with
 * R_f, falls with R_c2 and β, and is largest at one corner of any box inside them.
 */
export const otlCircuitResponse: Response = {
  box: [
    input('resistance_b1', 50, 150, 'kOhm'),
    input('resistance_b2', 25, 70, 'kOhm'),
    input('resistance_f', 0.5, 3, 'kOhm'),
    input('resistance_c1', 1.2, 2.5, 'kOhm'),
    input('resistance_c2', 0.25, 1.2, 'kOhm'),
    input('current_gain', 50, 300, 'A'),
  ],
  aim: 'largest',
  formula(rb1, rb2, rf, rc1, rc2, beta) {
    const vb1 = (12 * rb2) / (rb1 + rb2);
    const g = beta * (rc2 + 9);
    return ((vb1 + 0.74) * g + 11.35 * rf + (0.74 * rf * g) / rc1) / (g + rf);
  },
  best: (box) => cornerOf(box, ['low', 'high', 'high', 'low', 'low', 'low']),
};

/** The OTL circuit: as high a midpoint voltage as possible. */
export const otlCircuit = defineTaskFamily({
  name: 'otl-circuit',
  description: 'Midpoint voltage of a push-pull circuit in V, 6 columns, to be made as large as possible',
  source: 'Ben-Ari & Steinberg 2007',
  settings: z.strictObject({ moved: subBoxSetting }),
  make: ({ moved }, stream) => responseTask(otlCircuitResponse, moved, stream),
});
