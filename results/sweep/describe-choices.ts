import { formatScore } from '../format-number.js';
import type { SweepChoice, SweepChoices } from '../sweep.js';

/** How settings were chosen, in sentences, for the foot of a table. */
export function describeChoices({ on, choosingTasks, choices }: SweepChoices): string[] {
  if (on === 'same cells') return choices.map(warn);
  const half = on === 'seeds' ? 'the even seeds' : `the tasks ${choosingTasks.join(', ')}`;
  const reported =
    on === 'seeds'
      ? 'Tables report the odd seeds only, on which no settings were chosen. Seeds that would decide count these alone; a plan needs twice as many.'
      : 'Tables report the other tasks only, on which no settings were chosen.';
  return [...choices.map((choice) => describe(choice, half)), reported];
}

function describe(choice: SweepChoice, half: string): string {
  const { method, variants, by, cells, leftOut } = choice;
  const without = leftOut === 0 ? '' : `; ${leftOut} more, which not all variants have, were left out`;
  return `Settings of ${method}: chosen among ${variants} by mean ${by} on ${half} (${cells} cell${cells === 1 ? '' : 's'} each${without}): ${nameWinner(choice)}.`;
}

function warn(choice: SweepChoice): string {
  const { method, variants } = choice;
  return `CAUTION: the settings of ${method} were chosen among ${variants} on the very cells reported here, so its scores are too high: ${nameWinner(choice)}.`;
}

function nameWinner({ variant, by, score }: SweepChoice): string {
  return `${variant}, mean ${by} ${formatScore(score)} there`;
}
