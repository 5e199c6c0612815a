import { rootStream } from '../harness/random.js';
import { pairLedgers } from './guard/pair-ledgers.js';
import type { GuardSide } from './guard/side.js';
import { type LossTest, testLosses } from './guard/test-losses.js';

/** The scores that a guard can compare; the lift's difference is that of the best. */
export const guardScores = ['best', 'median'] as const;

export type GuardScore = (typeof guardScores)[number];

/** How two ledgers are compared. */
export interface GuardOptions {
  /** Largest loss without practical meaning, in normalized score, above 0. */
  readonly margin: number;
  readonly score: GuardScore;
  /** Labels of the methods to compare, as `a,b`; all that both ledgers hold unless given. */
  readonly methods?: string | undefined;
  /** Whether too few seeds are a failure. */
  readonly strict: boolean;
}

/** What a candidate lost against a baseline. */
export interface GuardReport {
  readonly baseline: SideName;
  readonly candidate: SideName;
  readonly margin: number;
  readonly score: GuardScore;
  readonly strict: boolean;
  /** By method, then by task and curtain; over all tasks last. */
  readonly tests: readonly LossTest[];
  /** What a reader should know of the pairing, in words. */
  readonly remarks: readonly string[];
  /** Whether the candidate passes: no regression and, when strict, nowhere too few seeds to show one. */
  readonly passed: boolean;
}

/** A ledger's folder and the program's version that wrote it. */
export interface SideName {
  readonly name: string;
  readonly program: string;
}

/**
 * Compares the ledger of a changed program, the candidate, with one from before the change, cell by cell. The result
 * does not depend on the order of rows.
 *
 * @throws OnebatchError (`bad-ledger`, `bad-input`) as `pairLedgers`; RangeError for a margin that isn't above 0.
 */
export function guardLedgers(baseline: GuardSide, candidate: GuardSide, options: GuardOptions): GuardReport {
  const { margin, score, methods, strict } = options;
  const paired = pairLedgers(baseline, candidate, { score, methods });
  const stream = rootStream(baseline.provenance.plan.seed).split('guard');
  const tests = testLosses(paired.methods, { margin, stream });
  const failing = ({ outcome }: LossTest) =>
    outcome === 'regression' || (strict && outcome === 'too few seeds');
  return {
    baseline: nameOf(baseline),
    candidate: nameOf(candidate),
    margin,
    score,
    strict,
    tests,
    remarks: paired.remarks,
    passed: !tests.some(failing),
  };
}

function nameOf({ name, provenance }: GuardSide): SideName {
  return { name, program: provenance.program };
}
