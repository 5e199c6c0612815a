import { describe, expect, test } from 'vitest';
import { rootStream, type Stream } from '../../harness/random.js';
import { decideAtLooks } from '../../results/decide-at-looks.js';
import type { TaskPairs } from '../../results/paired.js';

const planned = [8, 16, 24, 32];
const options = { margin: 0.02, alpha: 0.05, stream: rootStream(5) };

/** A method's differences to the reference on one task, seeds from 1 on. */
function pairs(differences: readonly number[], task = 'hill'): TaskPairs {
  const seeds = differences.map((_, i) => i + 1);
  return { task, curtain: 'open', seeds, differences, unpaired: 0 };
}

const noisy = (stream: Stream, n: number, mean: number, deviation: number): number[] =>
  Array.from({ length: n }, () => mean + deviation * stream.normal());

describe('decideAtLooks(methods, { planned, made })', () => {
  const clear = [pairs(noisy(rootStream(1), 32, 0.3, 0.05))];
  const same = [pairs(noisy(rootStream(2), 32, 0, 0.004))];
  const vague = [pairs(noisy(rootStream(3), 32, 0.01, 0.2))];

  test('before the first look, leaves all undecided', () => {
    expect(decideAtLooks([clear, same], { planned, made: 0 }, options)).toEqual([
      { verdict: 'undecided' },
      { verdict: 'undecided' },
    ]);
  });

  test('tells a clear gain before the last look, sameness within the margin, and what stays open', () => {
    const [gain, none, open] = decideAtLooks([clear, same, vague], { planned, made: 4 }, options);
    expect(gain).toMatchObject({ verdict: 'helps' });
    expect(gain).toHaveProperty('look', 2);
    expect(none).toMatchObject({ verdict: 'no real difference' });
    expect(open).toEqual({ verdict: 'undecided' });
  });

  test('passes over what lies beyond the last look made', () => {
    const turned = [pairs([...noisy(rootStream(1), 16, 0.3, 0.05), ...noisy(rootStream(1), 16, -9, 0.05)])];
    expect(decideAtLooks([turned], { planned, made: 2 }, options)[0]).toMatchObject({ verdict: 'helps' });
  });

  test('several tasks weigh the same, and help to decide sooner', () => {
    const differences = noisy(rootStream(4), 32, 0.05, 0.1);
    const one = [pairs(differences)];
    const four = ['a', 'b', 'c', 'd'].map((task, i) => pairs(noisy(rootStream(6 + i), 32, 0.05, 0.1), task));
    const lookOf = (tasks: readonly TaskPairs[]): number => {
      const [found] = decideAtLooks([tasks], { planned, made: 4 }, options);
      return found!.verdict === 'undecided' ? 5 : found!.look;
    };
    expect(lookOf(four)).toBeLessThan(lookOf(one));
  });
});
