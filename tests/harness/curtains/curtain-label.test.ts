import { describe, expect, test } from 'vitest';
import { type CurtainSpec, curtainLabel, curtainSchema } from '../../../harness/curtain.js';

const label = (spec: unknown) => curtainLabel(curtainSchema.parse(spec));

describe('curtainLabel(spec)', () => {
  test.each<[unknown, string]>([
    [{}, 'open'],
    [{ noise: 0 }, 'open'],
    [{ ceiling: 0.5, thin: 200, noise: 0.05 }, 'ceiling=0.5 thin=200 noise=0.05'],
    [{ noise: 0.05, thin: 200, ceiling: 0.5 }, 'ceiling=0.5 thin=200 noise=0.05'],
    [{ family: {} }, 'family=3x2'],
    [{ region: {} }, 'region=2x0.4'],
    [{ region: { around: 'optimum', columns: 1 } }, 'region=1x0.4@optimum'],
    [{ region: { where: { x2: [0, 0.5], site1: ['C', 'A', 'C'] } } }, 'region=site1:A/C;x2:0..0.5'],
    [{ region: { where: { 'my column': ['a/b', '1..2'] } } }, 'region="my column":"1..2"/"a/b"'],
    [{ region: { where: { x: [1, 2, 3] } } }, 'region=x:1/2/3'],
    [
      { noise: 1, thin: 9, family: { parents: 1, changes: 4 }, region: {}, ceiling: 0.25 },
      'ceiling=0.25 region=2x0.4 family=1x4 thin=9 noise=1',
    ],
  ])('names %j "%s"', (spec, text) => {
    expect(label(spec)).toBe(text);
  });

  test('stays one line whatever the columns and levels are called', () => {
    expect(label({ region: { where: { 'a\nb': ['c\r\nd', 'e f'] } } })).toMatch(/^[^\r\n]+$/);
  });

  test('tells apart curtains that differ', () => {
    const specs: CurtainSpec[] = [
      { region: { where: { a: ['b', 'c'] } } },
      { region: { where: { a: ['b/c'] } } },
      { region: { where: { a: ['b'], c: ['d'] } } },
      { region: { where: { a: ['b;c:d'] } } },
      { region: { where: { a: ['b c'] } } },
      { region: { where: { a: [0, 1] } } },
      { region: { where: { a: ['0', '1'] } } },
      { region: { where: { a: [1, 0] } } },
      { region: { where: { a: ['"b"'] } } },
      { region: { where: { a: ['b'] } } },
    ];
    expect(new Set(specs.map(curtainLabel)).size).toBe(specs.length);
  });
});
