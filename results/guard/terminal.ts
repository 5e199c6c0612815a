import { formatDifference, formatP } from '../format-number.js';
import type { GuardReport } from '../guard.js';
import { numberColumn, type TextColumn, wordColumn } from '../tables/text-columns.js';
import { oneLine, truncateText, wrapText } from '../tables/text-width.js';
import { describeTest, formatChance, formatSeedsNeeded } from './describe-test.js';
import { countOf } from './list-words.js';
import { guardAlpha, guardLevel, type LossOutcome, type LossTest } from './test-losses.js';

const width = 100;

/** Columns that a method's or task's name may take. */
const nameWidth = 20;

/** Outcomes that a reader should see in a sentence of their own, the gravest first. */
const told: readonly LossOutcome[] = ['regression', 'small loss'];

/** A guard's report for the terminal: a table of all tests, what stands out, and how it came about. */
export function renderGuard(report: GuardReport): string {
  const { baseline, candidate, score, margin, tests, remarks } = report;
  const head = `Guard: ${candidate.name} (onebatch ${candidate.program}) against ${baseline.name} (onebatch ${baseline.program}), by ${score}, margin ${margin}`;
  const sentences = told.flatMap((outcome) =>
    tests
      .filter((test) => test.outcome === outcome)
      .map((test) => `${outcome === 'regression' ? '✗' : '!'} ${describeTest(test, margin)}.`),
  );
  const lines = [
    ...wrap(head),
    '',
    ...tableOf(tests),
    '',
    ...[...sentences, ...remarks.map((remark) => `· ${remark}.`), explain(report)].flatMap(wrap),
    '',
    ...wrap(conclude(report)),
  ];
  return `${lines.join('\n')}\n`;
}

/** What the tests together say, in one line. */
export function conclude({ tests, margin, strict, passed }: GuardReport): string {
  const count = (outcome: LossOutcome) => tests.filter((test) => test.outcome === outcome).length;
  const few = count('too few seeds');
  const unseen =
    few === 0
      ? ''
      : `; ${few} of them had too few seeds to show one${strict ? ', which --strict fails' : ''}`;
  const regressions = count('regression');
  const found = regressions === 0 ? 'no regression shown' : `${countOf(regressions, 'regression')} found`;
  return `${passed ? 'Passed' : 'Failed'}: ${found} at a margin of ${margin} in ${countOf(tests.length, 'test')}${unseen}.`;
}

function tableOf(all: readonly LossTest[]): string[] {
  const tests = foldUnchanged(all);
  const name = (text: string) => truncateText(oneLine(text), nameWidth);
  const columns: TextColumn[] = [
    wordColumn(
      'method',
      tests.map(({ method }) => name(method)),
    ),
    wordColumn(
      'task',
      tests.map(({ place, everywhere }) => (everywhere ? 'everywhere' : name(place?.task ?? 'all tasks'))),
    ),
    numberColumn(
      'difference',
      tests.map(({ difference }) => formatDifference(difference)),
    ),
    wordColumn(`[${Math.round(100 * guardLevel)} %]`, tests.map(intervalOf)),
    numberColumn(
      'p loss',
      tests.map(({ lossP, outcome }) => (outcome === 'unchanged' ? '' : formatP(lossP))),
    ),
    wordColumn(
      'outcome',
      tests.map(({ outcome }) => outcome),
    ),
    numberColumn(
      'power',
      tests.map(({ power }) => (power === null ? '' : formatChance(power))),
    ),
    numberColumn(
      'needs',
      tests.map(({ seedsNeeded }) => (seedsNeeded === null ? '' : formatSeedsNeeded(seedsNeeded))),
    ),
  ];
  const line = (cells: readonly string[]) => cells.join('  ').trimEnd();
  return [
    line(columns.map(({ head }) => head)),
    ...tests.map((_, i) => line(columns.map(({ cells }) => cells[i]!))),
  ];
}

/** A line of the table: a test, or all of a method's tests where none of its scores changed. */
interface TableLine extends LossTest {
  readonly everywhere: boolean;
}

function foldUnchanged(tests: readonly LossTest[]): TableLine[] {
  const moved = new Set(tests.flatMap(({ method, outcome }) => (outcome === 'unchanged' ? [] : [method])));
  return tests.flatMap((test) => {
    const everywhere = test.place === null && !moved.has(test.method);
    const folded = test.place !== null && !moved.has(test.method) && tests.some(isWhole(test.method));
    return folded ? [] : [{ ...test, everywhere }];
  });
}

function isWhole(label: string): (test: LossTest) => boolean {
  return ({ method, place }) => place === null && method === label;
}

/** Pairs of a task, as in "12 pairs a task" or "8 to 12 pairs a task". */
function pairsATask(tests: readonly LossTest[]): string {
  const pairs = tests.flatMap((test) => (test.place === null ? [] : [test.pairs]));
  const [least, most] = [Math.min(...pairs), Math.max(...pairs)];
  return `${least === most ? countOf(most, 'pair') : `${least} to ${most} pairs`} a task`;
}

function intervalOf({ interval }: LossTest): string {
  return interval === null ? '' : `[${formatDifference(interval.low)}, ${formatDifference(interval.high)}]`;
}

function explain({ tests, margin }: GuardReport): string {
  const all = tests.some(({ place }) => place === null) ? ', each task and all tasks together' : ' and tasks';
  return `difference: candidate minus baseline, paired by task, curtain and seed, ${pairsATask(tests)}, with its ${Math.round(100 * guardLevel)} % interval. regression: a loss is shown (p loss ≤ ${guardAlpha}: one-sided sign flips, Fisher 1935) and one of ${margin} is not ruled out (one-sided t test of non-inferiority, Schuirmann 1987), Holm-corrected over all methods${all} (Holm 1979): a change without effect fails at most ${100 * guardAlpha} % of guards. power: the chance that these pairs would have shown a true loss of ${margin}; needs: seeds a task that would show it with 80 % power.`;
}

function wrap(text: string): string[] {
  return wrapText(oneLine(text), width, '  ');
}
