import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { catalogue } from '../../cli/catalogue.js';
import { packageRoot } from '../../cli/package-root.js';
import { demoPlan } from '../../cli/rehearse-options.js';
import { cellsOf } from '../../harness/cells.js';
import { readPlan } from '../../harness/plan/read.js';
import { setStage } from '../../harness/stage.js';

const readme = readFileSync(join(packageRoot, 'README.md'), 'utf8');
const written = [...readme.matchAll(/^```yaml\n(.*?)^```/gms)].map(([, text]) => text!);

test('the README shows a plan', () => {
  expect(written.length).toBeGreaterThan(0);
});

test.each([
  ['the demo', readFileSync(demoPlan, 'utf8')],
  ...written.map((text, i) => [`plan ${i + 1} of the README`, text]),
])('%s is read, and the first stage of each task and curtain can be set', (_, text) => {
  const plan = readPlan(text, 'p.plan.yaml', catalogue);
  const [method] = plan.methods;
  for (const cell of cellsOf({ ...plan, seeds: 1, methods: [method!] })) {
    expect(setStage(plan, cell, catalogue).designs.rows).toBeGreaterThan(1);
  }
});
