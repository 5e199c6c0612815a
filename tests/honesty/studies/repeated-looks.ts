import { planLooks } from '../../../harness/plan/looks.js';
import { decideAtLooks } from '../../../results/decide-at-looks.js';
import { defaultMargin } from '../../../results/paired.js';
import { defaultAlpha } from '../../../results/verdict.js';
import { isDifference } from '../is-difference.js';
import { judgeTable } from '../judge-table.js';
import { drawNothing, type Null, nullWords } from '../nothing-there.js';
import { defineStudy, repeats } from '../study.js';
import { countHits, type Promised } from '../tally.js';
import { taskWords } from '../task-words.js';

interface Part {
  readonly kind: Null;
  readonly tasks: 'one' | 'all';
  readonly methods: number;
  readonly rule: 'program' | 'none';
  readonly tables: number;
}

const looks = planLooks(8, 64);

const promised: Promised = { kind: 'at most', share: 0.05 };

const kinds = ['itself', 'skewed'] as const;

/** How often a table holds a wrong verdict when one looks again and again. */
export const repeatedLooks = defineStudy<Part>({
  title: 'Wrong verdicts, with seeds added until decided',
  text: `The same, where verdicts are looked at after ${looks.join(', ')} seeds and a verdict once reached stays, as with \`--until-decided\`. For comparison: how often it happens without the rule, by looking at an ordinary table each time and stopping at the first verdict.`,
  columns: {
    row: ['methods', 'tasks', 'of them', 'rule'],
    share: 'tables with a wrong verdict',
    more: [],
  },
  parts: kinds.flatMap((kind) => [
    { kind, tasks: 'one', methods: 1, rule: 'program', tables: 1600 },
    { kind, tasks: 'one', methods: 9, rule: 'program', tables: 400 },
    { kind, tasks: 'all', methods: 3, rule: 'program', tables: 240 },
    { kind, tasks: 'one', methods: 1, rule: 'none', tables: 1000 },
  ]),
  run({ kind, tasks, methods, rule, tables }, { scores, stream, effort }) {
    const tally = countHits(repeats(tables, effort), (repetition) => {
      const group = tasks === 'all' ? scores : [scores[repetition % scores.length]!];
      const own = stream.split(repetition);
      const drawn = drawNothing(kind, group, { methods, seeds: looks.at(-1)!, stream: own });
      return (rule === 'program' ? lookByRule : lookAtEach)(drawn, own);
    });
    const row = [
      nullWords[kind],
      taskWords(tasks, scores),
      String(methods),
      rule === 'program' ? "the program's" : 'none',
    ];
    return [{ row, tally, promised: rule === 'program' && kind === 'itself' ? promised : null, more: [] }];
  },
});

type Judge = (methods: readonly number[][][], stream: Parameters<typeof judgeTable>[1]) => boolean;

const lookByRule: Judge = (methods, stream) => {
  const pairs = methods.map((tasks) =>
    tasks.map((differences, task) => ({
      task: String(task),
      curtain: '',
      seeds: differences.map((_, i) => i + 1),
      differences,
      unpaired: 0,
    })),
  );
  const options = { margin: defaultMargin, alpha: defaultAlpha, stream };
  return decideAtLooks(pairs, { planned: looks, made: looks.length }, options).some(({ verdict }) =>
    isDifference(verdict),
  );
};

const lookAtEach: Judge = (methods, stream) =>
  looks.some((seeds) => {
    const soFar = methods.map((tasks) => tasks.map((differences) => differences.slice(0, seeds)));
    return judgeTable(soFar, stream).some(isDifference);
  });
