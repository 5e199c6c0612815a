import { tmpdir } from 'node:os';
import { describe, expect, test } from 'vitest';
import { z } from 'zod';
import { describeSettings } from '../../cli/list.js';
import { onebatch } from './program.js';

describe('describeSettings', () => {
  test('lists keys with their defaults and meanings, inner groups as group.key', () => {
    const schema = z.strictObject({
      size: z.int().default(3).describe('how many'),
      search: z.strictObject({ rate: z.number().default(0.5).describe('how fast') }).prefault({}),
      kind: z.enum(['a', 'b']).default('b'),
      target: z.number().optional().describe('where to'),
    });
    expect(describeSettings(schema)).toEqual([
      { key: 'size', standard: '3', meaning: 'how many' },
      { key: 'search.rate', standard: '0.5', meaning: 'how fast' },
      { key: 'kind', standard: '"b"', meaning: '' },
      { key: 'target', standard: 'none', meaning: 'where to' },
    ]);
  });
});

describe('onebatch list', () => {
  test('shows every task, method and part with its source, settings and defaults', async () => {
    const { code, stdout, stderr } = await onebatch(tmpdir(), ['list']);
    expect([code, stderr]).toEqual([0, '']);
    for (const title of ['Tasks', 'Methods', 'Surrogates', 'Searches', 'Cautions'])
      expect(stdout).toMatch(new RegExp(`^${title}`, 'm'));
    expect(stdout).toMatch(
      /^ {2}branin\n {6}Branin function.+\n {6}source: Branin 1972.+\n {6}moved = true {2}\(.+\)\n/m,
    );
    expect(stdout).toMatch(/^ {2}jitter\n {6}.+\n {6}source: common practice\n {6}parents = 10 {2}\(.+\)\n/m);
    expect(stdout).toMatch(/^ {6}search\.steps = \d+/m);
  });

  test('shows one section alone', async () => {
    const { code, stdout } = await onebatch(tmpdir(), ['list', 'cautions']);
    expect(code).toBe(0);
    expect(stdout).toMatch(/^Cautions/);
    expect(stdout).toContain('lower-bound');
    expect(stdout).not.toContain('branin');
  });

  test('ends quietly when its reader goes away', async () => {
    const ending = await onebatch(tmpdir(), ['list'], async ({ stdout }) => {
      stdout!.destroy();
    });
    expect(ending).toMatchObject({ code: 0, stderr: '' });
  });
});
