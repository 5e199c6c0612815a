import { defaultMargin } from '../../../results/paired.js';
import { adjustAndDecide, plannedPower } from '../../../results/verdict.js';
import { scatteredMethods } from '../draws.js';
import { testTable } from '../judge-table.js';
import { defineStudy, repeats } from '../study.js';
import { addTallies, countHits } from '../tally.js';
import { hardest } from '../task-words.js';
import { plant } from './planted.js';

interface Part {
  readonly difference: number;
}

const pilotSeeds = 16;

/** Pilots that ask for more seeds than this are left out. */
const mostSeeds = 2000;

/** How often a verdict is reached with the seeds that an undecided table asks for. */
export const pilot = defineStudy<Part>({
  title: 'The seeds that an undecided verdict asks for',
  text: `A table of one method with ${pilotSeeds} seeds that came out undecided, and a fresh one with the number of seeds that it asked for, at most ${mostSeeds.toLocaleString('en-US')}: how often that is decided. Nothing is promised: the number is for ${100 * plannedPower} % power *if the differences go on as they came*, and ${pilotSeeds} seeds tell their mean and deviation only roughly.`,
  columns: { row: ['true difference'], share: 'decided', more: ['least on'] },
  parts: [{ difference: 0.1 }, { difference: 0.05 }, { difference: 0.02 }, { difference: 0 }],
  run({ difference }, { scores, stream, effort }) {
    const found = scores.map((task) => {
      const names = scatteredMethods(task);
      let asked = 0;
      const { hits } = countHits(repeats(250, effort), (repetition) => {
        const own = stream.split(task.task, repetition);
        const method = names[repetition % names.length]!;
        const judge = (seeds: number, part: string) => {
          const drawing = own.split(part);
          const drawn = plant(task, { method, difference, seeds, stream: drawing });
          return adjustAndDecide(testTable([[drawn]], drawing), { margin: defaultMargin })[0]!;
        };
        const { seedsNeeded } = judge(pilotSeeds, 'pilot');
        if (seedsNeeded?.kind !== 'about' || seedsNeeded.seeds > mostSeeds) return false;
        asked++;
        return judge(seedsNeeded.seeds, 'fresh').verdict !== 'undecided';
      });
      return { hits, trials: asked };
    });
    const asking = scores.filter((_, i) => found[i]!.trials > 0);
    const tallies = found.filter(({ trials }) => trials > 0);
    const least = tallies.length === 0 ? '' : hardest(asking, tallies, 'least');
    return [{ row: [String(difference)], tally: addTallies(found), promised: null, more: [least] }];
  },
});
