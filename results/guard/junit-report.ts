import type { GuardReport } from '../guard.js';
import { type JunitCase, type JunitSuite, writeJunit } from '../junit.js';
import { describeTest, placeName } from './describe-test.js';
import type { LossTest } from './test-losses.js';

/** A guard's report for a build server: a suite a task, a case a method. */
export function renderGuardJunit(report: GuardReport): string {
  const places = [...new Set(report.tests.map(placeName))];
  return writeJunit(
    'onebatch guard',
    places.map((place) => suiteOf(report, place)),
  );
}

/** What a build server is told of ledgers that can't be paired, or of any other failure to compare them. */
export function renderGuardError(message: string): string {
  const failed: JunitCase = {
    name: 'the ledgers can be paired',
    className: 'onebatch guard',
    result: 'error',
    message,
    kind: "can't be paired",
  };
  return writeJunit('onebatch guard', [{ name: 'pairing', properties: {}, cases: [failed] }]);
}

function suiteOf(report: GuardReport, place: string): JunitSuite {
  const { baseline, candidate, margin, score, strict, remarks } = report;
  return {
    name: place,
    properties: {
      baseline: baseline.name,
      'baseline version': baseline.program,
      candidate: candidate.name,
      'candidate version': candidate.program,
      score,
      margin: String(margin),
      strict: String(strict),
      ...Object.fromEntries(remarks.map((remark, i) => [`remark ${i + 1}`, remark])),
    },
    cases: report.tests
      .filter((test) => placeName(test) === place)
      .map((test) => ({
        name: test.method,
        className: `onebatch guard.${place}`,
        result: resultOf(test, strict),
        message: describeTest(test, margin),
        kind: test.outcome,
      })),
  };
}

function resultOf({ outcome }: LossTest, strict: boolean): JunitCase['result'] {
  if (outcome === 'regression') return 'failed';
  if (outcome === 'too few seeds') return strict ? 'failed' : 'skipped';
  return 'passed';
}
