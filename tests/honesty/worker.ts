import { rootStream } from '../../harness/random.js';
import { readScores } from './score-table.js';
import { studies } from './studies/index.js';
import type { Finding } from './study.js';

/** What a worker is asked: one part of one study. */
export interface Question {
  readonly study: string;
  readonly part: number;
  readonly seed: number;
  readonly effort: number;
}

const scores = readScores();

/** Answers a part of a study; the answer depends on nothing but the question. */
export default function answer({ study, part, seed, effort }: Question): Finding[] {
  return studies[study]!.run(part, { scores, stream: rootStream(seed).split(study, part), effort });
}
