import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { OnebatchError } from '../../harness/errors.js';
import { fromRecord, ledgerColumns, toRecord } from '../../results/ledger-columns.js';
import { anyRow } from './any-row.js';
import { makeRow } from './made-ledger.js';

const row = makeRow({ method: 'jitter', seed: 3, optimism: 0.25 });

describe('toRecord', () => {
  test('writes a row by the columns of design: what identifies the cell first', () => {
    expect(Object.keys(toRecord(row))).toEqual([...ledgerColumns]);
    expect(ledgerColumns.slice(0, 5)).toEqual(['task', 'curtain', 'method', 'settings', 'seed']);
  });

  test('leaves the field of an absent optimism empty', () => {
    expect(toRecord({ ...row, optimism: undefined }).optimism).toBe('');
  });
});

describe('fromRecord', () => {
  test('gives back every row that toRecord wrote, to the last bit', () => {
    fc.assert(
      fc.property(anyRow, (any) => {
        expect(fromRecord(toRecord(any), 'l.csv', 2)).toStrictEqual(any);
      }),
    );
  });

  test.each([0, -0, 5e-324, 0.1 + 0.2, 1 / 3, 2 ** 53 + 2, Number.MAX_VALUE, -Number.MIN_VALUE])(
    'keeps the bits of %d',
    (value) => {
      expect(Object.is(fromRecord(toRecord({ ...row, lift: value }), 'l.csv', 2).lift, value)).toBe(true);
    },
  );

  test.each<[keyof ReturnType<typeof toRecord>, string]>([
    ['task', ''],
    ['settings', 'xyz'],
    ['seed', ''],
    ['seed', '1.5'],
    ['seed', '-1'],
    ['status', 'perhaps'],
    ['best', ''],
    ['best', '  '],
    ['median', 'NaN'],
    ['best_visible', 'Infinity'],
    ['lift', '0,5'],
    ['optimism', 'none'],
    ['visible', '3.5'],
    ['top_known', 'guessed'],
  ])('refuses a line whose %s is "%s", naming file, line and column', (column, value) => {
    const damaged = { ...toRecord(row), [column]: value };
    const read = () => fromRecord(damaged, 'out/ledger.csv', 7);
    expect(read).toThrow(OnebatchError);
    expect(read).toThrow(
      `out/ledger.csv:7: column "${column}" holds ${JSON.stringify(value)}, which is not what belongs there; remove the line and run the plan again`,
    );
  });
});
