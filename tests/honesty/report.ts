import { scoresOf, skewnessOf } from './draws.js';
import type { TaskScores } from './score-table.js';
import { type Finding, percent, type Study } from './study.js';
import { isKept, monteCarloError, type Promised } from './tally.js';

/** The command that writes the report. */
export const command = 'npm run honesty';

/** The report: what was simulated, and for each study a table. */
export function renderReport(
  studied: readonly { readonly study: Study; readonly findings: readonly Finding[] }[],
  about: { readonly scores: readonly TaskScores[]; readonly seed: number },
): string {
  const sections = studied.map(({ study, findings }) =>
    [`## ${study.title}`, '', study.text, '', ...renderTable(study, findings), ''].join('\n'),
  );
  return `${[renderHead(about), ...sections].join('\n').trimEnd()}\n`;
}

function renderHead({
  scores,
  seed,
}: {
  readonly scores: readonly TaskScores[];
  readonly seed: number;
}): string {
  const [first] = scores;
  const methods = [...first!.methods.keys()];
  return [
    '# How honest is the program?',
    '',
    `Written by \`${command}\`, seed ${seed}; the same on every machine. Thousands of comparisons are simulated by drawing seeds, with replacement, from the scores of ${methods.length} methods on ${scores.length} tasks with ${first!.seeds} seeds each (\`tests/honesty/scores.csv\`, made by \`npm run honesty:scores\`). The procedures are the program's own, called as it calls them. What is drawn from is known, and so what is true.`,
    '',
    'Shares stand with their Monte-Carlo standard error. *Kept* says whether a promise is kept: yes, no, or unsure where the share is on the wrong side by less than its 95 % Monte-Carlo interval (Wilson 1927).',
    '',
    'How skewed the scores are that were drawn from, least to most by method:',
    '',
    ...table(
      ['task', 'skewness of best'],
      scores.map((task) => [task.task, skewnessRange(task, methods)]),
    ),
    '',
  ].join('\n');
}

function skewnessRange(task: TaskScores, methods: readonly string[]): string {
  const all = methods.map((method) => skewnessOf(scoresOf(task, method)));
  return `${Math.min(...all).toFixed(1)} to ${Math.max(...all).toFixed(1)}`;
}

function renderTable({ columns }: Study, findings: readonly Finding[]): string[] {
  const promises = findings.some(({ promised }) => promised !== null);
  const kept = promises ? ['promised', 'kept'] : [];
  return table(
    [...columns.row, columns.share, ...kept, ...columns.more],
    findings.map(({ row, tally, promised, more }) => [
      ...row,
      `${percent(tally.hits / tally.trials)} ± ${(100 * monteCarloError(tally)).toFixed(1)}`,
      ...(promises ? [describePromise(promised), isKept(tally, promised)] : []),
      ...more,
    ]),
  );
}

function describePromise(promised: Promised): string {
  if (promised === null) return '';
  const whole = (share: number) => Math.round(100 * share);
  return promised.kind === 'between'
    ? `${whole(promised.low)} to ${whole(promised.high)} %`
    : `${promised.kind} ${whole(promised.share)} %`;
}

function table(heads: readonly string[], rows: readonly (readonly string[])[]): string[] {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;
  return [line(heads), line(heads.map(() => '---')), ...rows.map(line)];
}
