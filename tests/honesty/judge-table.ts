import type { Stream } from '../../harness/random.js';
import { type DifferenceTest, defaultMargin, testTaskDifferences } from '../../results/paired.js';
import { SignPatterns } from '../../results/statistics/sign-flip.js';
import { adjustAndJudge, type VerdictWord } from '../../results/verdict.js';

/**
 * The tests that a comparison would make of these methods.
 *
 * @param methods paired differences, (methods, tasks, seeds).
 */
export function testTable(
  methods: readonly (readonly (readonly number[])[])[],
  stream: Stream,
): DifferenceTest[] {
  const patterns = new SignPatterns(stream);
  return methods.map((tasks) => testTaskDifferences(tasks, { margin: defaultMargin, stream, patterns }));
}

/** The verdicts that a comparison would print of these methods; see `testTable`. */
export function judgeTable(
  methods: readonly (readonly (readonly number[])[])[],
  stream: Stream,
): VerdictWord[] {
  return adjustAndJudge(testTable(methods, stream)).map(({ verdict }) => verdict);
}
