import { XMLParser, XMLValidator } from 'fast-xml-parser';
import { describe, expect, test } from 'vitest';
import { renderGuardJunit } from '../../../results/guard/junit-report.js';
import { guardLedgers } from '../../../results/guard.js';
import { makePlan, makeRows, makeSide } from './guarded.js';

const nasty = 'a<b & "c"';
const plan = makePlan(['hill'], [nasty, 'steady', 'shaken'], { seeds: 8 });
const before = makeSide(
  'runs/before',
  plan,
  makeRows(plan, () => 0.5),
);
const losses: Readonly<Record<string, number>> = { [nasty]: 0.1, steady: 0 };
const after = makeSide(
  'runs/after',
  plan,
  makeRows(plan, (method, _, seed) => 0.5 - (losses[method] ?? (seed % 2 ? 0.2 : -0.2))),
);

interface Case {
  readonly name: string;
  readonly failure?: { readonly type: string };
  readonly skipped?: unknown;
}

/** The cases of the only suite, as another program reads them. */
function casesOf(strict: boolean): readonly Case[] {
  const report = guardLedgers(before, after, { margin: 0.02, score: 'best', strict });
  const xml = renderGuardJunit(report);
  expect(XMLValidator.validate(xml)).toBe(true);
  const parser = new XMLParser({ ignoreAttributes: false, attributeNamePrefix: '' });
  const read = parser.parse(xml) as { testsuites: { testsuite: { testcase: Case[] } } };
  return read.testsuites.testsuite.testcase;
}

describe('renderGuardJunit(report)', () => {
  test('keeps a label with < & and quotes, as an XML parser reads it back', () => {
    expect(casesOf(false).map(({ name }) => name)).toEqual([nasty, 'steady', 'shaken']);
  });

  test('fails a regression, skips what had too few seeds and passes the rest', () => {
    const [lost, steady, shaken] = casesOf(false);
    expect(lost?.failure?.type).toBe('regression');
    expect([steady?.failure, steady?.skipped]).toEqual([undefined, undefined]);
    expect([shaken?.failure, shaken?.skipped !== undefined]).toEqual([undefined, true]);
  });

  test('when strict, fails what had too few seeds', () => {
    const [, steady, shaken] = casesOf(true);
    expect([steady?.failure, shaken?.failure?.type]).toEqual([undefined, 'too few seeds']);
  });
});
