import { catalogue } from '../../cli/catalogue.js';
import { countCells } from '../../harness/cells.js';
import { openCrew } from '../../harness/crew.js';
import { readPlan } from '../../harness/plan/read.js';
import { runRehearsal } from '../../harness/rehearsal.js';
import { report } from './timing.js';

const planText = `
name: bench
seeds: 4
pool: 1000
batch: 24
curtains: [{ceiling: 0.7, thin: 150, noise: 0.1}]
tasks: [{task: hartmann-6}, {task: recipe}]
methods:
  - jitter
  - additive
  - {method: gradient-ascent, settings: {surrogate: {steps: 200}}}
  - {method: gradient-ascent, as: wider, settings: {surrogate: {steps: 200, width: 96}}}
`;

/** Cells per second at 1 and 2 workers, and the share of the crew's time that is spent outside the methods. */
export async function benchCells(): Promise<void> {
  const plan = readPlan(planText, 'bench.plan.yaml', catalogue);
  let first = 0;
  for (const workers of [1, 2]) {
    const crew = openCrew(new URL('../../cli/worker.js', import.meta.url), workers);
    let inMethods = 0;
    const run = () =>
      runRehearsal({
        plan,
        catalogue,
        crew,
        finished: new Set(),
        signal: new AbortController().signal,
        onFinished: async ({ seconds }) => {
          inMethods += seconds;
        },
      });
    await run();
    inMethods = 0;
    const start = performance.now();
    await run();
    const seconds = (performance.now() - start) / 1000;
    await crew.close();
    const pace = countCells(plan) / seconds;
    first ||= pace;
    report(`cells a second, ${workers} worker${workers === 1 ? '' : 's'}`, pace, '1/s', pace / first);
    report('  share of time outside the methods', 100 * (1 - inMethods / (workers * seconds)), '%');
  }
}
