import { defaultMargin } from '../../../results/paired.js';
import { scatteredMethods } from '../draws.js';
import { judgeTable } from '../judge-table.js';
import { defineStudy, repeats } from '../study.js';
import { addTallies, countHits, type Promised } from '../tally.js';
import { hardest } from '../task-words.js';
import { plant } from './planted.js';

interface Part {
  readonly methods: number;
  readonly seeds: number;
}

const promised: Promised = { kind: 'at most', share: 0.05 };

/** How often a method that differs by the margin is said not to differ. */
export const falseEquivalence = defineStudy<Part>({
  title: 'Wrong "no real difference"',
  text: `Tables in which every method differs from the reference by the margin, ${defaultMargin}, upwards and downwards in turn, and how often any of them is said not to differ. Otherwise as above.`,
  columns: { row: ['methods', 'seeds'], share: 'tables with a wrong verdict', more: ['most on'] },
  parts: [1, 3].flatMap((methods) => [8, 16, 32].map((seeds) => ({ methods, seeds }))),
  run({ methods, seeds }, { scores, stream, effort }) {
    const tallies = scores.map((task) => {
      const names = scatteredMethods(task);
      return countHits(repeats(500, effort), (repetition) => {
        const own = stream.split(task.task, repetition);
        const difference = repetition % 2 === 0 ? defaultMargin : -defaultMargin;
        const drawn = Array.from({ length: methods }, (_, k) => {
          const method = names[(repetition + k) % names.length]!;
          return [plant(task, { method, difference, seeds, stream: own.split(k) })];
        });
        return judgeTable(drawn, own).includes('no real difference');
      });
    });
    const row = [String(methods), String(seeds)];
    return [{ row, tally: addTallies(tallies), promised, more: [hardest(scores, tallies, 'most')] }];
  },
});
