import type { Stream } from '../../../harness/random.js';
import { defaultMargin } from '../../../results/paired.js';
import { moments } from '../../../results/statistics/moments.js';
import { countSeedsNeeded, defaultAlpha, plannedPower, type VerdictWord } from '../../../results/verdict.js';
import { differencesOf, drawPositions, moveTo, pick, scatteredMethods } from '../draws.js';
import { judgeTable } from '../judge-table.js';
import { drawNothing } from '../nothing-there.js';
import type { TaskScores } from '../score-table.js';
import { defineStudy, repeats } from '../study.js';
import { addTallies, countHits, type Promised } from '../tally.js';
import { hardest } from '../task-words.js';

/** Methods that would need more seeds than this are left out. */
const mostPlanted = 1000;

interface Part {
  /** True mean difference of one method; the others of its table don't differ. */
  readonly difference: number;
  readonly methods: number;
  readonly tables: number;
}

const promised: Promised = { kind: 'at least', share: plannedPower };

/** How often a planted difference is found with the number of seeds that the program asks for. */
export const planted = defineStudy<Part>({
  title: 'Planted differences, with the seeds that the program asks for',
  text: `Real differences of a method to the reference, moved to a known mean, upwards and downwards in turn. The number of seeds is what the program would ask for if it knew this mean and the deviation; methods that would need more than ${mostPlanted.toLocaleString('en-US')} are left out. Found: *helps* or *hurts*, whichever is right; for a difference of 0, *no real difference* within ±${defaultMargin}. In a table of three the other two do not differ.`,
  columns: { row: ['difference', 'methods', 'seeds'], share: 'found', more: ['least on'] },
  parts: [0.1, 0.05, 0.02, 0].flatMap((difference) => [
    { difference, methods: 1, tables: 2000 },
    { difference, methods: 3, tables: difference < 0.03 ? 400 : 1000 },
  ]),
  run({ difference, methods, tables }, { scores, stream, effort }) {
    const numbers: number[] = [];
    const found = scores.map((task) => {
      const able = plan(task, difference, methods);
      numbers.push(...able.map(({ seeds }) => seeds));
      if (able.length === 0) return { hits: 0, trials: 0 };
      return countHits(repeats(tables / scores.length, effort), (repetition) => {
        const own = stream.split(task.task, repetition);
        const { method, seeds } = able[repetition % able.length]!;
        const sign = repetition % 2 === 0 ? 1 : -1;
        const drawn = plant(task, { method, difference: sign * difference, seeds, stream: own });
        const others =
          methods === 1 ? [] : drawNothing('skewed', [task], { methods: methods - 1, seeds, stream: own });
        return judgeTable([[drawn], ...others], own)[0] === rightVerdict(sign * difference);
      });
    });
    const [least, most] = [Math.min(...numbers), Math.max(...numbers)];
    const row = [difference === 0 ? '0' : `±${difference}`, String(methods), `${least} to ${most}`];
    return [{ row, tally: addTallies(found), promised, more: [hardest(scores, found, 'least')] }];
  },
});

/** Methods, and how many seeds the program would ask for to find a difference of each. */
function plan(task: TaskScores, difference: number, tests: number): { method: string; seeds: number }[] {
  return scatteredMethods(task).flatMap((method) => {
    const { standardDeviation } = moments(differencesOf(task, method));
    const evidence = { tasks: 1, n: 1, mean: difference, standardDeviation: standardDeviation! };
    const needed = countSeedsNeeded(evidence as Parameters<typeof countSeedsNeeded>[0], {
      margin: defaultMargin,
      alpha: defaultAlpha,
      tests,
    });
    return needed.kind === 'about' && needed.seeds <= mostPlanted ? [{ method, seeds: needed.seeds }] : [];
  });
}

/** Differences of a method, moved to the mean given; n drawn with replacement. */
export function plant(
  task: TaskScores,
  how: {
    readonly method: string;
    readonly difference: number;
    readonly seeds: number;
    readonly stream: Stream;
  },
): number[] {
  const values = moveTo(differencesOf(task, how.method), how.difference);
  return pick(values, drawPositions(how.seeds, values.length, how.stream));
}

function rightVerdict(difference: number): VerdictWord {
  if (difference === 0) return 'no real difference';
  return difference > 0 ? 'helps' : 'hurts';
}
