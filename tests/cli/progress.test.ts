import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { describeSeconds, startProgress } from '../../cli/progress.js';

describe('describeSeconds', () => {
  test.each([
    [0, '0 s'],
    [59.4, '59 s'],
    [59.6, '1 min 0 s'],
    [200, '3 min 20 s'],
    [3599, '59 min 59 s'],
    [3600, '1 h 0 min'],
    [7500, '2 h 5 min'],
  ])('%d as "%s"', (seconds, text) => {
    expect(describeSeconds(seconds)).toBe(text);
  });
});

describe('startProgress where the output is no terminal', () => {
  const lines: string[] = [];
  const terminal = process.stderr.isTTY;

  beforeEach(() => {
    lines.length = 0;
    process.stderr.isTTY = false;
    vi.useFakeTimers({ toFake: ['performance'] });
    vi.spyOn(process.stderr, 'write').mockImplementation((text) => {
      lines.push(String(text));
      return true;
    });
  });
  afterEach(() => {
    vi.restoreAllMocks();
    vi.useRealTimers();
    process.stderr.isTTY = terminal;
  });

  test('writes a plain line every ten seconds and one at the end', () => {
    const progress = startProgress(10, 0);
    for (let cell = 0; cell < 10; cell++) {
      vi.advanceTimersByTime(4000);
      progress.advance(cell % 4 === 1);
    }
    progress.stop();
    expect(lines).toEqual([
      '3/10 cells, 1 failed, 28 s left\n',
      '6/10 cells, 2 failed, 16 s left\n',
      '9/10 cells, 2 failed, 4 s left\n',
      '10/10 cells, 3 failed, 0 s left\n',
    ]);
  });

  test('counts cells of before as done, but not as work of this time', () => {
    const progress = startProgress(100, 90);
    vi.advanceTimersByTime(20_000);
    progress.advance(false);
    expect(lines).toEqual(['91/100 cells, 0 failed, 3 min 0 s left\n']);
  });
});
