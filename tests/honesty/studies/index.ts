import type { Study } from '../study.js';
import { coverage } from './coverage.js';
import { falseEquivalence } from './equivalence.js';
import { falseVerdicts } from './false-verdicts.js';
import { falseAlarms, guardedLosses } from './guard.js';
import { pilot } from './pilot.js';
import { planted } from './planted.js';
import { repeatedLooks } from './repeated-looks.js';

/** All questions, in the order of the report. */
export const studies: Readonly<Record<string, Study>> = {
  'false-verdicts': falseVerdicts,
  'repeated-looks': repeatedLooks,
  coverage,
  planted,
  equivalence: falseEquivalence,
  pilot,
  'false-alarms': falseAlarms,
  'guarded-losses': guardedLosses,
};
