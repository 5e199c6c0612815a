import { describe, expect, test } from 'vitest';
import { rootStream } from '../../harness/random.js';
import { type LookEvidence, sequentialRule } from '../../results/sequential.js';

const clear: LookEvidence = { p: 1e-12, difference: 0.2, equivalenceP: 1 };
const open: LookEvidence = { p: 0.5, difference: 0.01, equivalenceP: 0.5 };

/** What the rule for the given shares of information says of the evidence. */
const decide = (evidence: LookEvidence[][], information: number[]) =>
  sequentialRule({ information })(evidence);

describe('sequentialRule({ information })', () => {
  test('keeps a verdict that was reached, whatever later looks say', () => {
    const [verdict] = decide([[open, clear, open]], [0.25, 0.5, 0.75, 1]);
    expect(verdict).toEqual({ verdict: 'helps', look: 2 });
  });

  test('says hurts for a clear negative difference and no real difference inside the margin', () => {
    const worse = { ...clear, difference: -0.2 };
    const same = { p: 0.9, difference: 0, equivalenceP: 1e-12 };
    const verdicts = decide([[worse], [same], [open]], [1]);
    expect(verdicts).toEqual([
      { verdict: 'hurts', look: 1 },
      { verdict: 'no real difference', look: 1 },
      { verdict: 'undecided' },
    ]);
  });

  test('at one look, is Holm’s procedure', () => {
    // Holm 1979 on p = .01, .04, .03, .005 rejects the first and the last (tests/reference/statistics.json)
    const evidence = [0.01, 0.04, 0.03, 0.005].map((p) => [{ p, difference: 1, equivalenceP: 1 }]);
    const verdicts = decide(evidence, [1]).map(({ verdict }) => verdict);
    expect(verdicts).toEqual(['helps', 'undecided', 'undecided', 'helps']);
  });

  test('an early look needs far stronger evidence than the last one', () => {
    const evidence = [{ p: 0.01, difference: 0.1, equivalenceP: 1 }];
    expect(decide([evidence], [0.25, 1])[0]!.verdict).toBe('undecided');
    expect(decide([evidence], [1])[0]!.verdict).toBe('helps');
  });

  test('calls equals different in at most 5 % of families, over ten looks and three methods', () => {
    const stream = rootStream(3);
    const families = 2000;
    const looks = 10;
    const information = Array.from({ length: looks }, (_, i) => (i + 1) / looks);
    const rule = sequentialRule({ information });
    let wrong = 0;
    for (let family = 0; family < families; family++) {
      const evidence = Array.from({ length: 3 }, () => nullEvidence(stream, looks));
      wrong += Number(rule(evidence).some(({ verdict }) => verdict !== 'undecided'));
    }
    // Three independent methods at α/3 each: 4.9 % is expected; four standard errors above 5 % would be an error.
    expect(wrong / families).toBeLessThan(0.05 + 4 * Math.sqrt((0.05 * 0.95) / families));
    expect(wrong).toBeGreaterThan(0);
  });

  test('refuses methods with different numbers of looks, and more looks than planned', () => {
    expect(() => decide([[open], [open, open]], [0.5, 1])).toThrow(RangeError);
    expect(() => decide([[open, open]], [1])).toThrow(RangeError);
  });
});

/** Evidence of a method that equals the reference: a random walk's p at each look. */
function nullEvidence(stream: ReturnType<typeof rootStream>, looks: number): LookEvidence[] {
  let position = 0;
  return Array.from({ length: looks }, (_, i) => {
    position += stream.normal();
    const z = position / Math.sqrt(i + 1);
    return { p: twoSided(z), difference: z, equivalenceP: 1 };
  });
}

/** Two-sided normal p, to 1.5e-7 (Abramowitz & Stegun 1964, 7.1.26). */
function twoSided(z: number): number {
  const x = Math.abs(z) / Math.SQRT2;
  const t = 1 / (1 + 0.3275911 * x);
  const series =
    t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  return series * Math.exp(-x * x);
}
