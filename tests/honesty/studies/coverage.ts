import type { Stream } from '../../../harness/random.js';
import { estimateInterquartileMeans } from '../../../results/estimate.js';
import { defaultResamples } from '../../../results/overall.js';
import { bcaMeanInterval } from '../../../results/statistics/bca.js';
import { interquartileMean } from '../../../results/statistics/interquartile-mean.js';
import { meanInterval } from '../../../results/statistics/mean-interval.js';
import { moments } from '../../../results/statistics/moments.js';
import { median } from '../../../results/statistics/quantile.js';
import { stratifiedBootstrap } from '../../../results/statistics/stratified-bootstrap.js';
import { stratifiedInterval } from '../../../results/statistics/stratified-interval.js';
import { studentInterval } from '../../../results/statistics/student-interval.js';
import { transformedInterval } from '../../../results/statistics/transformed-interval.js';
import { differencesOf, drawPositions, pick, scatteredMethods, scoresOf } from '../draws.js';
import { bootstrapTInterval } from '../others/bootstrap-t.js';
import { johnsonInterval } from '../others/johnson.js';
import { defineStudy, percent, repeats } from '../study.js';
import { addTallies, type Promised, type Tally } from '../tally.js';

type Bounds = { readonly low: number; readonly high: number };

/** An interval of what the values of several tasks, one array a task, estimate. */
type Procedure = (tasks: readonly (readonly number[])[], stream: Stream) => Bounds;

interface Subject {
  /** What is estimated of the values that could have been drawn. */
  readonly truth: (tasks: readonly ArrayLike<number>[]) => number;
  readonly ofDifferences: boolean;
  readonly overTasks: boolean;
  /** The first is the program's. */
  readonly procedures: Readonly<Record<string, Procedure>>;
}

interface Part {
  readonly subject: string;
  readonly seeds: number;
}

const resamples = 2000;

const promised: Promised = { kind: 'between', low: 0.93, high: 0.97 };

const bca: Procedure = ([values], stream) => bcaMeanInterval(values!, { resamples, stream });
const student: Procedure = ([values]) => studentInterval(values!);
const transformed: Procedure = ([values]) => transformedInterval(values!);
const bootstrapT: Procedure = ([values], stream) => bootstrapTInterval(values!, { resamples, stream });

const subjects: Readonly<Record<string, Subject>> = {
  'mean score': {
    truth: meanOfMeans,
    ofDifferences: false,
    overTasks: false,
    procedures: {
      "Hall's transformed t": ([values]) => bounded(meanInterval(values!)),
      'BCa bootstrap': bca,
      "Student's t": student,
      "Johnson's t": ([values]) => johnsonInterval(values!),
      'bootstrap-t': bootstrapT,
    },
  },
  'mean difference': {
    truth: meanOfMeans,
    ofDifferences: true,
    overTasks: false,
    procedures: {
      "Student's t": (tasks) => stratifiedInterval(tasks)!,
      'BCa bootstrap': bca,
      "Hall's transformed t": transformed,
      'bootstrap-t': bootstrapT,
    },
  },
  'mean score over all tasks': {
    truth: meanOfMeans,
    ofDifferences: false,
    overTasks: true,
    procedures: {
      "Satterthwaite's t": (tasks) => stratifiedInterval(tasks)!,
      'percentile bootstrap': percentile('mean-of-task-means'),
    },
  },
  'mean difference over all tasks': {
    truth: meanOfMeans,
    ofDifferences: true,
    overTasks: true,
    procedures: {
      "Satterthwaite's t": (tasks) => stratifiedInterval(tasks)!,
      'percentile bootstrap': percentile('mean-of-task-means'),
    },
  },
  'IQM over all tasks': {
    truth: (tasks) => interquartileMean(tasks.flatMap((values) => Array.from(values))),
    ofDifferences: false,
    overTasks: true,
    procedures: {
      'expanded percentiles': (tasks, stream) =>
        estimateInterquartileMeans([tasks], { resamples: defaultResamples, stream })[0]!.interval!,
      'percentile bootstrap': percentile('interquartile-mean'),
    },
  },
};

/** How often 95 % intervals hold the true mean. */
export const coverage = defineStudy<Part>({
  title: 'Intervals that hold the truth',
  text: `How often a 95 % interval covers the mean of the values that the seeds were drawn from: all of a method's scores on a task, or its differences to the reference. The first procedure of each block is the program's; the others are what it could have used (bootstraps with ${resamples.toLocaleString('en-US')} resamples). A sample of equal values gives an interval without width, which counts as a miss unless it lies at the mean. "Missed": how often the truth lay below the interval, and above. Width: that of the program's for the same seeds is 1; the median.`,
  columns: {
    row: ['of', 'seeds', 'procedure'],
    share: 'covered',
    more: ['by task', 'missed', 'width'],
  },
  parts: Object.keys(subjects).flatMap((subject) => [8, 16, 32].map((seeds) => ({ subject, seeds }))),
  run({ subject, seeds }, { scores, stream, effort }) {
    const { truth, ofDifferences, overTasks, procedures } = subjects[subject]!;
    const names = Object.keys(procedures);
    const groups = overTasks ? [scores] : scores.map((task) => [task]);
    const results = groups.map(() => names.map(() => new Coverage()));
    groups.forEach((group, g) => {
      const methods = ofDifferences ? scatteredMethods(group[0]!) : [...group[0]!.methods.keys()];
      for (const method of methods) {
        const values = group.map((task) => (ofDifferences ? differencesOf : scoresOf)(task, method));
        const target = truth(values);
        for (let repetition = 0; repetition < repeats(overTasks ? 300 : 200, effort); repetition++) {
          const own = stream.split(group[0]!.task, method, repetition);
          const drawn = values.map((of) => pick(of, drawPositions(seeds, of.length, own)));
          const flat = drawn.every((of) => of.every((value) => value === of[0]));
          const at = truth(drawn);
          const bounds = names.map((name) =>
            flat ? { low: at, high: at } : procedures[name]!(drawn, own.split(name)),
          );
          const usual = bounds[0]!.high - bounds[0]!.low;
          bounds.forEach((found, p) => {
            results[g]![p]!.add(found, { truth: target, usual });
          });
        }
      }
    });
    return names.map((name, p) => {
      const own = results.map((group) => group[p]!);
      const tally = addTallies(own.map((found) => found.tally));
      const sides = [
        addTallies(own.map((found) => found.below)),
        addTallies(own.map((found) => found.above)),
      ];
      return {
        row: [subject, String(seeds), name],
        tally,
        promised: p === 0 ? promised : null,
        more: [
          overTasks ? '' : scores.map(({ task }, g) => `${task} ${share(own[g]!.tally)}`).join(', '),
          sides.map(({ hits, trials }) => percent(hits / trials)).join(' / '),
          median(own.flatMap(({ widths }) => widths)).toFixed(2),
        ],
      };
    });
  },
});

/** Counts on which side of intervals the truth lies. */
class Coverage {
  #trials = 0;
  #below = 0;
  #above = 0;
  /** Widths as multiples of what is usual. */
  readonly widths: number[] = [];

  add({ low, high }: Bounds, { truth, usual }: { readonly truth: number; readonly usual: number }): void {
    // A sum in another order may differ from the truth by its rounding.
    const rounding = 1e-12 * Math.max(1, Math.abs(truth));
    this.#trials++;
    if (truth < low - rounding) this.#below++;
    if (truth > high + rounding) this.#above++;
    if (usual > 0) this.widths.push((high - low) / usual);
  }

  get tally(): Tally {
    return { hits: this.#trials - this.#below - this.#above, trials: this.#trials };
  }

  get below(): Tally {
    return { hits: this.#below, trials: this.#trials };
  }

  get above(): Tally {
    return { hits: this.#above, trials: this.#trials };
  }
}

function percentile(aggregate: 'mean-of-task-means' | 'interquartile-mean'): Procedure {
  return (tasks, stream) => stratifiedBootstrap(tasks, { aggregate, resamples, stream });
}

function meanOfMeans(tasks: readonly ArrayLike<number>[]): number {
  return tasks.reduce((sum, values) => sum + moments(values).mean, 0) / tasks.length;
}

function bounded(interval: ReturnType<typeof meanInterval>): Bounds {
  if (interval.method === 'none') throw new RangeError('no interval of a single value');
  return interval;
}

function share({ hits, trials }: Tally): string {
  return (100 * (hits / trials)).toFixed(1);
}
