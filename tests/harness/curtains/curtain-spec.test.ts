import { describe, expect, test } from 'vitest';
import { curtainSchema } from '../../../harness/curtain.js';

describe('curtainSchema', () => {
  test('fills in the defaults of region and family', () => {
    expect(curtainSchema.parse({ region: {}, family: {} })).toEqual({
      region: { columns: 2, share: 0.4, around: 'random' },
      family: { parents: 3, changes: 2 },
    });
    expect(curtainSchema.parse({})).toEqual({});
  });

  test('describes every part', () => {
    for (const [key, schema] of Object.entries(curtainSchema.shape)) {
      expect(schema.description, key).toMatch(/^[a-z].*[^.]$/);
    }
  });

  test.each([
    [{ ceiling: 0 }, 'ceiling'],
    [{ ceiling: 1 }, 'ceiling'],
    [{ ceiling: Number.NaN }, 'ceiling'],
    [{ thin: 1 }, 'thin'],
    [{ thin: 2.5 }, 'thin'],
    [{ noise: -0.1 }, 'noise'],
    [{ noise: Number.POSITIVE_INFINITY }, 'noise'],
    [{ family: { parents: 0 } }, 'family.parents'],
    [{ family: { change: 1 } }, 'family'],
    [{ region: { share: 1 } }, 'region.share'],
    [{ region: { around: 'here' } }, 'region'],
    [{ region: { where: {} } }, 'region'],
    [{ region: { where: { x: [] } } }, 'region'],
    [{ region: { where: { x: [0, 1] }, share: 0.5 } }, 'region'],
    [{ ceil: 0.5 }, ''],
  ])('refuses %j at "%s"', (spec, path) => {
    const { success, error } = curtainSchema.safeParse(spec);
    expect(success).toBe(false);
    expect(error?.issues.map((issue) => issue.path.join('.'))).toContain(path);
  });

  test.each([{ around: 'here' }, { where: {} }, { where: { x: [] } }, 'x'])(
    'says what a region can be when it is %j',
    (region) => {
      expect(curtainSchema.safeParse({ region }).error?.issues[0]?.message).toMatch(
        /^expected \{ where: .* share /,
      );
    },
  );
});
