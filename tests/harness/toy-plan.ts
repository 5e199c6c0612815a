import type { Plan } from '../../harness/plan/plan.js';
import { readPlan } from '../../harness/plan/read.js';
import { toyCatalogue } from './toy-catalogue.js';

/** A plan of the toy catalogue, read from lines of YAML. */
export function toyPlan(...lines: string[]): Plan {
  return readPlan(lines.join('\n'), 'toy.plan.yaml', toyCatalogue);
}

/** Two tasks, one of them behind two curtains, three methods, three seeds: 27 cells. */
export const smallPlan: Plan = toyPlan(
  'seeds: 3',
  'pool: 40',
  'batch: 4',
  'budgetSeconds: 5',
  'tasks:',
  '  - slope',
  '  - { task: blend, curtains: [{ ceiling: 0.5 }, { thin: 12, noise: 0.1 }] }',
  'curtains: [{ ceiling: 0.6 }]',
  'methods:',
  '  - scripted',
  '  - idle-best',
  '  - { method: scripted, as: long, settings: { search: { steps: 20 } } }',
);
