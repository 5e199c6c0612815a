import { z } from 'zod';
import { defineTaskFamily } from '../harness/task.js';
import { cornerOf, input, type Response, responseTask, subBoxSetting } from './response.js';

/**
 * Flow of water through a borehole, m³/yr (Harper & Gupta 1983; ranges as in Morris, Mitchell & Ylvisaker 1993):
 *
 * 2π T_u (H_u − H_l) / (ln(r/r_w) [1 + 2 L T_u / (ln(r/r_w) r_w² K_w) + T_u/T_l]).
 *
 * Divided through by T_u it is 2π (H_u − H_l) / [ln(r/r_w) (1/T_u + 1/T_l) + 2 L / (r_w² K_w)]. On the published
 * ranges H_u > H_l and r > r_w, so every factor is positive: the flow rises with r_w, T_u, H_u, T_l and K_w, falls
 * with r, H_l and L, and is largest at one corner of any box inside them.
 */
export const boreholeResponse: Response = {
  box: [
    input('borehole_radius', 0.05, 0.15, 'm'),
    input('radius_of_influence', 100, 50_000, 'm'),
    input('upper_transmissivity', 63_070, 115_600, 'm2/yr'),
    input('upper_head', 990, 1110, 'm'),
    input('lower_transmissivity', 63.1, 116, 'm2/yr'),
    input('lower_head', 700, 820, 'm'),
    input('borehole_length', 1120, 1680, 'm'),
    input('borehole_conductivity', 9855, 12_045, 'm/yr'),
  ],
  aim: 'largest',
  formula(rw, r, tu, hu, tl, hl, l, kw) {
    const logRatio = Math.log(r / rw);
    const resistance = logRatio * (1 + (2 * l * tu) / (logRatio * rw * rw * kw) + tu / tl);
    return (2 * Math.PI * tu * (hu - hl)) / resistance;
  },
  best: (box) => cornerOf(box, ['high', 'low', 'high', 'high', 'high', 'low', 'low', 'high']),
};

/** The borehole: as much flow as possible. */
export const borehole = defineTaskFamily({
  name: 'borehole',
  description: 'Water flow through a borehole in m3/yr, 8 columns, to be made as large as possible',
  source: 'Harper & Gupta 1983; Morris, Mitchell & Ylvisaker 1993',
  settings: z.strictObject({ moved: subBoxSetting }),
  make: ({ moved }, stream) => responseTask(boreholeResponse, moved, stream),
});
