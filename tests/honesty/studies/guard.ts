import type { Stream } from '../../../harness/random.js';
import { chanceToShow, seedsToShow } from '../../../results/guard/loss-power.js';
import type { MethodPairs } from '../../../results/guard/pair-ledgers.js';
import { guardAlpha, type LossOutcome, testLosses } from '../../../results/guard/test-losses.js';
import { moments } from '../../../results/statistics/moments.js';
import { plannedPower } from '../../../results/verdict.js';
import { drawPositions, moveTo, pick, rerunDifferences } from '../draws.js';
import type { TaskScores } from '../score-table.js';
import { defineStudy, percent, repeats } from '../study.js';
import { countHits, type Promised } from '../tally.js';

interface AlarmPart {
  readonly methods: 'one' | 'all';
  readonly seeds: number;
}

interface MissPart {
  readonly loss: number;
  readonly seeds: number | 'asked for';
}

const margin = 0.02;

/** How often the guard stops a candidate that is the baseline with other random numbers. */
export const falseAlarms = defineStudy<AlarmPart>({
  title: 'False alarms of the guard',
  text: 'The baseline and the same methods rehearsed again with other random numbers, all tasks, with the margin 0.02: how often the guard shows a regression of any method on any task or over all tasks.',
  columns: { row: ['methods', 'seeds'], share: 'alarms', more: [] },
  parts: (['one', 'all'] as const).flatMap((methods) => [8, 16, 32].map((seeds) => ({ methods, seeds }))),
  run({ methods, seeds }, { scores, stream, effort }) {
    const names = rerunMethods(scores);
    const promised: Promised = { kind: 'at most', share: guardAlpha };
    const tally = countHits(repeats(methods === 'one' ? 1600 : 800, effort), (repetition) => {
      const own = stream.split(repetition);
      const positions = scores.map((task) => drawPositions(seeds, task.seeds, own));
      const chosen = methods === 'one' ? [names[repetition % names.length]!] : names;
      const pairs = chosen.map((method) => ({
        method,
        sections: scores.map((task, t) => {
          const differences = pick(rerunDifferences(task, method), positions[t]!);
          return sectionOf(
            task,
            differences.map((value) => (own.uniform() < 0.5 ? value : -value)),
          );
        }),
      }));
      return outcomesOf(pairs, own, margin).includes('regression');
    });
    const count = methods === 'one' ? '1' : String(names.length);
    return [{ row: [count, String(seeds)], tally, promised, more: [] }];
  },
});

/** How often the guard finds a planted loss. */
export const guardedLosses = defineStudy<MissPart>({
  title: 'Losses that the guard finds',
  text: 'The same for one method on one task, made worse by a known loss, with that loss as the margin. Shown: the guard says *regression* or *small loss*; promised is the power that it would state if it knew the deviation, as the mean over methods, and with the seeds that it asks for at least 80 %. Stopped: it says *regression*. A loss of exactly the margin is at times taken for a smaller one, and let pass: that should happen in 5 % at most.',
  columns: { row: ['task', 'loss', 'seeds'], share: 'shown', more: ['power stated', 'stopped'] },
  parts: [0.05, 0.1].flatMap((loss) => [
    { loss, seeds: 16 as const },
    { loss, seeds: 'asked for' as const },
  ]),
  run({ loss, seeds }, { scores, stream, effort }) {
    return scores.map((task) => {
      const able = rerunMethods([task]).map((method) => {
        const standardDeviation = moments(symmetric(task, method)).standardDeviation!;
        const design = { loss, standardDeviation, level: guardAlpha };
        const asked = seedsToShow(1, design);
        if (asked.kind !== 'about') throw new RangeError(`no number of seeds shows a loss of ${loss}`);
        const pairs = seeds === 'asked for' ? asked.seeds : seeds;
        return { method, pairs, power: chanceToShow(pairs, design) };
      });
      let stopped = 0;
      const tally = countHits(repeats(1000, effort), (repetition) => {
        const own = stream.split(task.task, repetition);
        const { method, pairs } = able[repetition % able.length]!;
        const values = moveTo(symmetric(task, method), -loss);
        const differences = pick(values, drawPositions(pairs, values.length, own));
        const outcomes = outcomesOf([{ method, sections: [sectionOf(task, differences)] }], own, loss);
        if (outcomes.includes('regression')) stopped++;
        return outcomes.includes('regression') || outcomes.includes('small loss');
      });
      const numbers = able.map(({ pairs }) => pairs);
      const [least, most] = [Math.min(...numbers), Math.max(...numbers)];
      const power = able.reduce((sum, it) => sum + it.power, 0) / able.length;
      const promised: Promised = {
        kind: 'at least',
        share: seeds === 'asked for' ? plannedPower : Math.floor(100 * power) / 100,
      };
      const count = least === most ? String(least) : `${least} to ${most}`;
      return {
        row: [task.task, String(loss), count],
        tally,
        promised,
        more: [percent(power), percent(stopped / tally.trials)],
      };
    });
  },
});

/** Methods whose scores depend on their random numbers on every task given. */
function rerunMethods(scores: readonly TaskScores[]): string[] {
  return [...scores[0]!.methods.keys()].filter((method) =>
    scores.every((task) => rerunDifferences(task, method).some((value) => value !== 0)),
  );
}

/** Baseline and candidate can be swapped in every pair. */
function symmetric(task: TaskScores, method: string): Float64Array {
  const differences = [...rerunDifferences(task, method)];
  return Float64Array.from([...differences, ...differences.map((value) => -value)]);
}

function sectionOf({ task }: TaskScores, differences: readonly number[]): MethodPairs['sections'][number] {
  const seeds = differences.map((_, i) => i + 1);
  return { task, curtain: '', seeds, differences, unpaired: 0, failures: { before: 0, after: 0 } };
}

function outcomesOf(methods: readonly MethodPairs[], stream: Stream, largest: number): LossOutcome[] {
  return testLosses(methods, { margin: largest, stream }).map(({ outcome }) => outcome);
}
