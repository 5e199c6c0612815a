import { adjustAndJudge, defaultAlpha } from '../../../results/verdict.js';
import { isDifference } from '../is-difference.js';
import { testTable } from '../judge-table.js';
import { drawNothing, type Null, nullWords } from '../nothing-there.js';
import { transformedP } from '../others/transformed-p.js';
import { defineStudy, type Finding, repeats } from '../study.js';
import { addTallies, countHits, type Promised, type Tally } from '../tally.js';
import { hardest, taskWords } from '../task-words.js';

interface Part {
  readonly kind: Null;
  readonly tasks: 'one' | 'all';
  readonly methods: number;
  readonly seeds: number;
}

/** Simulated tables, by their number of methods. */
const tablesFor: Readonly<Record<number, number>> = { 1: 2400, 3: 1200, 9: 800 };

const promised: Promised = { kind: 'at most', share: defaultAlpha };

/** How often a table holds a verdict of a difference where there is none. */
export const falseVerdicts = defineStudy<Part>({
  title: 'Wrong verdicts, with a fixed number of seeds',
  text: 'A table in which no method differs from the reference, and how often *any* of its methods is said to help or hurt. In the first block the methods are the reference itself with other random numbers: what is promised. In the second they are other methods, whose differences to the reference were moved to a mean of 0 and are as skewed as they come; sign flips suppose symmetry, so that nothing is promised, and the rows say by how much this is missed. "And transformed t" is a stricter rule that the program does not use: a verdict also needs p < 0.05 by a t test that allows for skewness (Hall 1992). "1 task" takes the tasks in turn; the last column is the one with most wrong verdicts.',
  columns: {
    row: ['methods', 'tasks', 'of them', 'seeds', 'rule'],
    share: 'tables with a wrong verdict',
    more: ['most on'],
  },
  parts: (['itself', 'skewed'] as const).flatMap((kind) =>
    (['one', 'all'] as const).flatMap((tasks) =>
      [1, 3, 9].flatMap((methods) => [8, 16, 32].map((seeds) => ({ kind, tasks, methods, seeds }))),
    ),
  ),
  run({ kind, tasks, methods, seeds }, { scores, stream, effort }) {
    const groups = tasks === 'all' ? [scores] : scores.map((task) => [task]);
    const strict: Tally[] = [];
    const usual = groups.map((group) => {
      let strictHits = 0;
      const tally = countHits(repeats(tablesFor[methods]! / groups.length, effort), (repetition) => {
        const own = stream.split(group.length, group[0]!.task, repetition);
        const drawn = drawNothing(kind, group, { methods, seeds, stream: own });
        const tests = testTable(drawn, own);
        if (tasks === 'one') {
          const both = tests.map((test, i) => ({
            ...test,
            p: Math.max(test.p, transformedP(drawn[i]![0]!)),
          }));
          if (isAnyDifferent(both)) strictHits++;
        }
        return isAnyDifferent(tests);
      });
      strict.push({ hits: strictHits, trials: tally.trials });
      return tally;
    });
    const find = (rule: string, tallies: readonly Tally[]): Finding => ({
      row: [nullWords[kind], taskWords(tasks, scores), String(methods), String(seeds), rule],
      tally: addTallies(tallies),
      promised: kind === 'itself' && tallies === usual ? promised : null,
      more: [tasks === 'all' ? '' : hardest(scores, tallies, 'most')],
    });
    const own = find("the program's", usual);
    return kind === 'skewed' && tasks === 'one' ? [own, find('and transformed t', strict)] : [own];
  },
});

function isAnyDifferent(tests: Parameters<typeof adjustAndJudge>[0]): boolean {
  return adjustAndJudge(tests).some(({ verdict }) => isDifference(verdict));
}
