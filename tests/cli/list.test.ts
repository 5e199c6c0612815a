import { describe, expect, test } from 'vitest';
import { z } from 'zod';
import { describeSettings } from '../../cli/list.js';

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
