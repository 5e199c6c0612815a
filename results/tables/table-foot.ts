import type { Comparison } from '../comparison.js';
import type { Overall } from '../overall.js';
import type { Section } from '../section.js';
import { exactUpTo } from '../statistics/sign-flip.js';
import { describeTop, plural } from './words.js';

/** What a table of one section, or of all tasks, needs beside it to stand alone, in one paragraph. */
export function describeTable(comparison: Comparison, table: Section | Overall): string {
  const sections = 'task' in table ? [table] : comparison.sections;
  const cells = table.methods.reduce((sum, scores) => sum + scores.cells, 0);
  const failures = table.methods.reduce((sum, scores) => sum + scores.failures, 0);
  const facts = [
    'true scores, normalized: 0 is the worst design of the pool, 1 the top; brackets hold 95 % intervals',
    describeSeeds(sections),
    ...comparison.foot.sweeps.map((sentence) => sentence.replace(/\.$/, '')),
    ...describeTests(comparison, table),
    `${failures} of ${plural(cells, 'cell')} failed, counted as batches of the worst visible design`,
    `${sections.length === 1 ? 'curtain' : 'curtains'}: ${[...new Set(sections.map(({ curtain }) => curtain || 'none'))].join('; ')}`,
    `top: ${describeTops(sections)}`,
    `onebatch ${comparison.version}`,
  ];
  const text = facts.join('. ');
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}

function describeSeeds(sections: readonly Section[]): string {
  const seeds = sections.map((section) => section.seeds);
  const [least, most] = [Math.min(...seeds), Math.max(...seeds)];
  return `${least === most ? plural(most, 'seed') : `${least} to ${most} seeds`}${sections.length > 1 ? ' a task' : ''}`;
}

function describeTests({ against }: Comparison, { reference }: Section | Overall): string[] {
  if (reference === null) return [];
  const pairs = reference.methods.map((method) => method.pairs);
  const [least, most] = [Math.min(...pairs), Math.max(...pairs)];
  const drawn = reference.methods.some(({ test }) => test === 'sign-flip-drawn');
  return [
    `difference: ${against.score} minus that of ${against.method} on the same seed, ${least === most ? plural(most, 'pair') : `${least} to ${most} pairs`}`,
    `p: sign-flip test${drawn ? ` (patterns drawn beyond ${exactUpTo} pairs)` : ''}, Holm-corrected for ${plural(reference.methods.length, 'test')}`,
    `verdict at ${against.alpha}, margin ±${against.margin}; in parentheses the seeds a task that would decide at 80 % power`,
    ...(against.looks === null
      ? []
      : [
          `seeds added until decided, ${plural(against.looks.made, 'look')} of ${against.looks.planned.length} planned: O'Brien-Fleming type spending (Lan & DeMets 1983) in Holm's steps`,
        ]),
  ];
}

function describeTops(sections: readonly Section[]): string {
  const known = [...new Set(sections.flatMap(({ top }) => top))];
  return describeTop(known).slice('1 = '.length);
}
