import { catalogue } from '../../cli/catalogue.js';
import { countCells } from '../../harness/cells.js';
import { openCrew } from '../../harness/crew.js';
import { readPlan } from '../../harness/plan/read.js';
import { runRehearsal } from '../../harness/rehearsal.js';
import { report } from './timing.js';

/** The demo's methods that train networks, on the demo's tasks. */
const planText = (backend: string, seeds: number): string => `
name: bench
seed: 1
seeds: ${seeds}
pool: 2000
batch: 24
backend: ${backend}
tasks:
  - { task: recipe, curtains: [{ ceiling: 0.7, thin: 150, noise: 0.2 }] }
  - { task: styblinski-tang, settings: { dimensions: 12 }, curtains: [{ ceiling: 0.5, thin: 200, noise: 0.3 }] }
  - task: nk
    settings: { length: 12, interactions: 2, alphabet: 4 }
    curtains: [{ family: { parents: 3, changes: 3 }, thin: 150, noise: 0.2 }]
methods: [gradient-ascent, ensemble-ascent, conservative]
`;

/** Cells a second of the demo's networks on one worker, on the kernel and on tfjs. */
export async function benchBackends(): Promise<void> {
  const kernel = await cellsASecond('kernel', 8);
  const tfjs = await cellsASecond('wasm', 2);
  report('cells a second of networks, 1 worker, tfjs on wasm', tfjs, '1/s');
  report('  the same on the kernel', kernel, '1/s', kernel / tfjs);
}

async function cellsASecond(backend: string, seeds: number): Promise<number> {
  const crew = openCrew(new URL('../../cli/worker.js', import.meta.url), 1);
  const run = async (count: number) => {
    const plan = readPlan(planText(backend, count), 'bench.plan.yaml', catalogue);
    const start = performance.now();
    await runRehearsal({
      plan,
      catalogue,
      crew,
      finished: new Set(),
      signal: new AbortController().signal,
      onFinished: async () => {},
    });
    return (1000 * countCells(plan)) / (performance.now() - start);
  };
  await run(1);
  const pace = await run(seeds);
  await crew.close();
  return pace;
}
