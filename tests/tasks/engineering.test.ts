import { describe, expect, test } from 'vitest';
import { matrixFromRows } from '../../harness/designs.js';
import { rootStream } from '../../harness/random.js';
import { sampleColumn } from '../../harness/space.js';
import type { Task, TaskFamily } from '../../harness/task.js';
import { borehole, boreholeResponse } from '../../tasks/borehole.js';
import { otlCircuit, otlCircuitResponse } from '../../tasks/otl-circuit.js';
import { piston, pistonResponse } from '../../tasks/piston.js';
import type { Box, Response } from '../../tasks/response.js';
import { wingWeight, wingWeightResponse } from '../../tasks/wing-weight.js';
import { describeTaskContract } from './contract.js';
import { gap, type PublishedFunction, publishedFunction, scoreOf } from './published.js';

interface Entry extends PublishedFunction {
  readonly inputs: readonly string[];
  readonly bounds: readonly (readonly [number, number])[];
  readonly value_at_box_centre: { readonly x: readonly number[]; readonly f: number };
  readonly optimum: Readonly<Record<'min' | 'max', { readonly f: number; readonly x: readonly number[] }>>;
}

const cases: readonly (readonly [name: string, family: TaskFamily, response: Response])[] = [
  ['borehole', borehole, boreholeResponse],
  ['otl-circuit', otlCircuit, otlCircuitResponse],
  ['piston', piston, pistonResponse],
  ['wing-weight', wingWeight, wingWeightResponse],
];

function make(family: TaskFamily, settings: Record<string, unknown>, seed = 1): Task {
  return family.make(family.settings.parse(settings), rootStream(seed));
}

/** The sub-box of an instance, its columns back in the published order. */
function boxOf(task: Task, response: Response): Box {
  return response.box.map(({ name }) => {
    const column = task.space.columns.find((candidate) => candidate.name === name);
    if (column?.kind !== 'continuous') throw new Error(`no continuous column ${name}`);
    return column;
  });
}

for (const [name, family] of cases)
  describeTaskContract(name, family, [{}, { moved: false }], { instances: 10 });

describe('responses as published, tests/reference/test-functions.json', () => {
  test.each(cases)(
    '%s with moved: false has the published value at 5 points and the centre',
    (name, family, { aim }) => {
      const { check_points, value_at_box_centre } = publishedFunction<Entry>(name);
      const task = make(family, { moved: false });
      const sign = aim === 'largest' ? 1 : -1;
      expect(check_points).toHaveLength(5);
      for (const { x, f } of [...check_points, value_at_box_centre]) {
        expect(gap(scoreOf(task, x), sign * f), x.join()).toBeLessThan(1e-10);
      }
    },
  );

  test.each(cases)('%s lives in the published box, with the published units', (name, family) => {
    const { bounds, inputs } = publishedFunction<Entry>(name);
    const { columns } = make(family, { moved: false }).space;
    expect(columns.map((column) => (column.kind === 'continuous' ? [column.low, column.high] : []))).toEqual(
      bounds,
    );
    const units = inputs.map((text) => /\((.*)\)/.exec(text)?.[1]);
    expect(columns.map((column) => (column.kind === 'continuous' ? column.unit : 'no'))).toEqual(units);
  });

  test.each(cases)(
    '%s has the optimum that differential evolution and a corner scan found',
    (name, family, { aim }) => {
      const { f, x } = publishedFunction<Entry>(name).optimum[aim === 'largest' ? 'max' : 'min'];
      const { optimum } = make(family, { moved: false });
      expect(gap(optimum.value, aim === 'largest' ? f : -f)).toBeLessThan(1e-12);
      expect(Array.from(optimum.design!)).toEqual(x);
      expect(optimum.known).toBe('exact');
    },
  );
});

describe('moved instances', () => {
  test.each(cases)(
    '%s trims every range by at most 15 % at each end and shuffles its columns',
    (_, family, response) => {
      const orders = new Set<string>();
      const boxes = new Set<string>();
      for (let seed = 1; seed <= 20; seed++) {
        const task = make(family, {}, seed);
        expect(task.space.columns).toHaveLength(response.box.length);
        boxOf(task, response).forEach(({ low, high, unit }, i) => {
          const published = response.box[i]!;
          const room = 0.15 * (published.high - published.low);
          expect(low).toBeGreaterThanOrEqual(published.low);
          expect(low).toBeLessThanOrEqual(published.low + room);
          expect(high).toBeLessThanOrEqual(published.high);
          expect(high).toBeGreaterThanOrEqual(published.high - room);
          expect(unit).toBe(published.unit);
        });
        orders.add(task.space.columns.map(({ name }) => name).join());
        boxes.add(
          boxOf(task, response)
            .map(({ low, high }) => [low, high])
            .join(),
        );
      }
      expect(orders.size).toBeGreaterThan(15);
      expect(boxes.size).toBe(20);
    },
  );

  test.each(cases)('%s scores a design by its columns wherever they stand', (_, family, { box }) => {
    const published = make(family, { moved: false });
    for (let seed = 1; seed <= 10; seed++) {
      const task = make(family, {}, seed);
      const inputs = new Map(
        task.space.columns.map((column) => [column.name, sampleColumn(column, rootStream(seed))]),
      );
      const shuffled = task.space.columns.map(({ name }) => inputs.get(name)!);
      const straight = box.map(({ name }) => inputs.get(name)!);
      expect(scoreOf(task, shuffled)).toBe(scoreOf(published, straight));
    }
  });

  test.each(cases)(
    '%s is not beaten by any corner, nor by a corner with one input inside',
    (_, family, response) => {
      for (let seed = 1; seed <= 20; seed++) {
        const task = make(family, {}, seed);
        const { columns } = task.space;
        const box = boxOf(task, response);
        const ranges = columns.map(({ name }) => box.find((column) => column.name === name)!);
        const stream = rootStream(seed);
        const corners = Array.from({ length: 2 ** columns.length }, (_, corner) =>
          ranges.map(({ low, high }, j) => {
            return (corner >> j) & 1 ? high : low;
          }),
        );
        const edges = corners.map((corner) => {
          const inside = stream.below(columns.length);
          return corner.map((value, j) => (j === inside ? sampleColumn(columns[j]!, stream) : value));
        });
        const scores = task.truth(matrixFromRows([...corners, ...edges]));
        const slack = 1e-12 * Math.abs(task.optimum.value);
        expect(Math.max(...scores)).toBeLessThanOrEqual(task.optimum.value + slack);
      }
    },
  );
});

/** Share of random points of a box at which the response rises when one input does. */
function riseShare({ formula }: Pick<Response, 'formula'>, box: Box, i: number, points = 400): number {
  const stream = rootStream(i);
  let rises = 0;
  for (let n = 0; n < points; n++) {
    const x = box.map((column) => sampleColumn(column, stream));
    const step = 1e-4 * (box[i]!.high - box[i]!.low);
    const up = x.map((value, k) => (k === i ? value + step : value));
    if (formula(...up) > formula(...x)) rises++;
  }
  return rises / points;
}

describe('the monotonicity that the exact optima rest on', () => {
  test('borehole rises or falls with each input over the whole published box', () => {
    const shares = boreholeResponse.box.map((_, i) => riseShare(boreholeResponse, boreholeResponse.box, i));
    expect(shares).toEqual([1, 0, 1, 1, 1, 0, 0, 1]);
  });

  test('otl-circuit rises or falls with each input over the whole published box', () => {
    const shares = otlCircuitResponse.box.map((_, i) =>
      riseShare(otlCircuitResponse, otlCircuitResponse.box, i),
    );
    expect(shares).toEqual([0, 1, 1, 0, 0, 0]);
  });

  test('wing-weight rises or falls with each input but the sweep, and is even in the sweep', () => {
    const { box, formula } = wingWeightResponse;
    const rightHalf = box.map((column) => (column.name === 'sweep_angle' ? { ...column, low: 0 } : column));
    expect(box.map((_, i) => riseShare(wingWeightResponse, rightHalf, i))).toEqual([
      1, 1, 1, 1, 1, 1, 0, 1, 1, 1,
    ]);
    const middle = box.map(({ low, high }) => (low + high) / 2);
    const swept = (angle: number) => formula(...middle.map((value, i) => (i === 3 ? angle : value)));
    for (const angle of [0.5, 3, 10]) expect(swept(angle)).toBe(swept(-angle));
  });

  test('wing-weight keeps the sweep nearest to 0 where the box leaves 0 out', () => {
    const sweepOf = (low: number, high: number) =>
      wingWeightResponse.best(
        wingWeightResponse.box.map((column) =>
          column.name === 'sweep_angle' ? { ...column, low, high } : column,
        ),
      )[3];
    expect([sweepOf(-8, 7), sweepOf(2, 7), sweepOf(-8, -3)]).toEqual([0, 2, -3]);
  });

  test('piston falls with the area and rises with the gas volume over the whole published box', () => {
    expect(riseShare(pistonResponse, pistonResponse.box, 1)).toBe(0);
    expect(riseShare(pistonResponse, pistonResponse.box, 2)).toBe(1);
  });

  test('piston is not monotone in the other inputs over the whole published box', () => {
    for (const i of [0, 3, 4, 5, 6]) {
      const share = riseShare(pistonResponse, pistonResponse.box, i, 2000);
      expect(share, pistonResponse.box[i]!.name).toBeGreaterThan(0);
      expect(share, pistonResponse.box[i]!.name).toBeLessThan(1);
    }
  });

  test('piston is monotone in one input after another, those before it within 15 % of their best end', () => {
    const steps: [input: number, bestEnd: 'low' | 'high'][] = [
      [1, 'high'],
      [2, 'low'],
      [4, 'high'],
      [5, 'low'],
      [6, 'high'],
      [0, 'low'],
    ];
    let box = pistonResponse.box;
    for (const [i, bestEnd] of steps) {
      expect(riseShare(pistonResponse, box, i), box[i]!.name).toBe(bestEnd === 'low' ? 1 : 0);
      box = box.map((column, j) => {
        if (j !== i) return column;
        const room = 0.15 * (column.high - column.low);
        return bestEnd === 'low'
          ? { ...column, high: column.low + room }
          : { ...column, low: column.high - room };
      });
    }
    // Then the time first rises and then falls with the spring, so one of its ends is best.
    const stream = rootStream(7);
    let turns = 0;
    for (let n = 0; n < 200; n++) {
      const x = box.map((column) => sampleColumn(column, stream));
      const times = Array.from({ length: 81 }, (_, k) => {
        return pistonResponse.formula(...x.map((value, j) => (j === 3 ? 1000 + 50 * k : value)));
      });
      const top = times.indexOf(Math.max(...times));
      if (top > 0 && top < 80) turns++;
      for (let k = 1; k <= 80; k++) expect(times[k]! > times[k - 1]!).toBe(k <= top);
    }
    expect(turns).toBeGreaterThan(0);
  });
});
