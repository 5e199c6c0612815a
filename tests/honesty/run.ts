import { writeFile } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { Tinypool } from 'tinypool';
import { packageRoot } from '../../cli/package-root.js';
import { renderReport } from './report.js';
import { readScores } from './score-table.js';
import { studies } from './studies/index.js';
import type { Finding } from './study.js';
import type { Question } from './worker.js';

const seed = 1;

/** Puts every part of every study to workers, and writes what they found into `results/honesty.md`. */
async function measureHonesty(): Promise<void> {
  const pool = new Tinypool({
    filename: new URL('./worker.js', import.meta.url).href,
    maxThreads: availableParallelism(),
    isolateWorkers: false,
  });
  const questions = Object.entries(studies).map(([study, { title, parts }]) => {
    const answers = Array.from({ length: parts }, (_, part) => {
      return pool.run({ study, part, seed, effort: 1 } satisfies Question) as Promise<Finding[]>;
    });
    return { study, title, answers };
  });
  const studied = [];
  for (const { study, title, answers } of questions) {
    const findings = (await Promise.all(answers)).flat();
    process.stdout.write(`${title}: done\n`);
    studied.push({ study: studies[study]!, findings });
  }
  await pool.destroy();
  const file = join(packageRoot, 'results', 'honesty.md');
  await writeFile(file, renderReport(studied, { scores: readScores(), seed }));
  process.stdout.write(`written to ${file}\n`);
}

await measureHonesty();
