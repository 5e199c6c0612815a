import type { TaskFamily } from '../harness/task.js';
import { ackley } from './ackley.js';
import { borehole } from './borehole.js';
import { branin } from './branin.js';
import { hartmann3, hartmann6 } from './hartmann.js';
import { ising } from './ising.js';
import { levy } from './levy.js';
import { nk } from './nk.js';
import { otlCircuit } from './otl-circuit.js';
import { piston } from './piston.js';
import { rastrigin } from './rastrigin.js';
import { recipe } from './recipe.js';
import { rosenbrock } from './rosenbrock.js';
import { styblinskiTang } from './styblinski-tang.js';
import { wingWeight } from './wing-weight.js';

/** All task families that plans can name. */
export const tasks: readonly TaskFamily[] = [
  branin,
  rosenbrock,
  ackley,
  rastrigin,
  levy,
  styblinskiTang,
  hartmann3,
  hartmann6,
  borehole,
  otlCircuit,
  piston,
  wingWeight,
  nk,
  ising,
  recipe,
];
