import { describe, expect, test } from 'vitest';
import { z } from 'zod';
import { type Designs, rowView, takeRows } from '../../harness/designs.js';
import { OnebatchError } from '../../harness/errors.js';
import type { Method, Offer, Proposal } from '../../harness/method.js';
import { openStream, rootStream } from '../../harness/random.js';
import { type Column, findBreach, makeSpace, type Space, sampleUniform } from '../../harness/space.js';

/**
 * The small tables that every method meets: three kinds of space, a table with fewer rows than the batch, and one in
 * which most designs were measured several times, with different scores.
 */
export const offerKinds = ['continuous', 'mixed', 'sequence', 'few rows', 'duplicate rows'] as const;
export type OfferKind = (typeof offerKinds)[number];

export interface OfferOptions {
  /** Visible rows; default 40, and 5 for `few rows`. */
  readonly rows?: number;
  /** Designs to propose; default 8. */
  readonly batchSize?: number;
  /** Default 1. */
  readonly seed?: number;
}

/** An offer whose table is drawn uniformly and scored by a toy truth with a little noise; fixed by its arguments. */
export function makeOffer(kind: OfferKind, options: OfferOptions = {}): Offer {
  const { rows = kind === 'few rows' ? 5 : 40, batchSize = 8, seed = 1 } = options;
  const space = spaces[kind]();
  const stream = rootStream(seed).split('offer', kind);
  const drawn = sampleUniform(space, rows, stream.split('designs'));
  const distinct = Math.ceil(rows / 4);
  const designs =
    kind === 'duplicate rows'
      ? takeRows(
          drawn,
          Array.from({ length: rows }, (_, i) => i % distinct),
        )
      : drawn;
  const noise = stream.split('noise');
  const scores = toyTruth(space, designs).map((score) => score + 0.05 * noise.normal());
  return { space, designs, scores, batchSize, stream: stream.split('method'), budgetSeconds: 60 };
}

/**
 * A score with its single maximum 0 at a known design: columns are worth −(u − 0.3)², with u the value's share of its
 * range; a category loses 0.5 unless its level is its column's number modulo the count of levels. Shape (n, d) to (n).
 */
export function toyTruth(space: Space, designs: Designs): Float64Array {
  return Float64Array.from({ length: designs.rows }, (_, i) =>
    space.columns.reduce((sum, column, j) => sum - toyLoss(column, j, rowView(designs, i)[j]!), 0),
  );
}

function toyLoss(column: Column, j: number, value: number): number {
  if (column.kind === 'category') return value === j % column.levels.length ? 0 : 0.5;
  return ((value - column.low) / (column.high - column.low) - 0.3) ** 2;
}

/** Made anew for each offer, so that a method that changes its space is found out. */
const spaces: Record<OfferKind, () => Space> = {
  continuous: () =>
    makeSpace([
      { kind: 'continuous', name: 'heat', low: 20, high: 90 },
      { kind: 'continuous', name: 'acid', low: -1, high: 1 },
      { kind: 'continuous', name: 'salt', low: 0, high: 0.001 },
    ]),
  mixed: makeMixed,
  sequence: () =>
    makeSpace(
      Array.from({ length: 6 }, (_, j) => ({
        kind: 'category',
        name: `site ${j + 1}`,
        levels: ['A', 'C', 'G', 'T'],
      })),
    ),
  'few rows': makeMixed,
  'duplicate rows': makeMixed,
};

function makeMixed(): Space {
  return makeSpace([
    { kind: 'continuous', name: 'heat', low: 20, high: 90 },
    { kind: 'integer', name: 'cycles', low: 1, high: 12 },
    { kind: 'category', name: 'solvent', levels: ['water', 'ethanol', 'toluene'] },
    { kind: 'integer', name: 'wash', low: 0, high: 1 },
  ]);
}

/** A kind of offer that a method is excused from, and why, in words. */
export interface Exception {
  readonly kind: OfferKind;
  readonly reason: string;
}

export interface ContractOptions extends OfferOptions {
  /** Settings to use instead of the defaults, for methods that would be slow with them. */
  readonly settings?: Record<string, unknown>;
  /** Offers the method must refuse, with `method-cannot`. */
  readonly refuses?: readonly Exception[];
  /** Offers it is not tested on. */
  readonly skip?: readonly Exception[];
}

/**
 * What every method promises, as a suite: on each kind of offer it proposes exactly the batch, inside the space, the
 * same again from the same stream, with finite beliefs, and leaves the offer as it was.
 */
export function describeMethodContract(method: Method, options: ContractOptions = {}): void {
  const { settings = {}, refuses = [], skip = [], ...offerOptions } = options;
  const propose = async (offer: Offer) => method.propose(offer, method.settings.parse(settings));

  describe(`${method.name} keeps the method contract`, () => {
    test('is named by lower-case words joined by hyphens, with one line of description and a source', () => {
      expect(method.name).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
      expect(method.description).toMatch(/^\S.*\S$/);
      expect(method.source).toMatch(/^\S.*\S$/);
    });

    test('parses {} to its defaults, describes every setting and refuses an unknown one', () => {
      expect(method.settings.safeParse({}).success).toBe(true);
      expect(undescribed(method.settings)).toEqual([]);
      expect(method.settings.safeParse({ 'no such setting': 1 }).success).toBe(false);
    });

    for (const kind of offerKinds) {
      const skipped = skip.find((exception) => exception.kind === kind);
      const refused = refuses.find((exception) => exception.kind === kind);
      for (const exception of [skipped, refused]) {
        if (exception !== undefined && exception.reason.trim() === '')
          throw new RangeError(`${method.name} is excused from "${kind}" without a reason`);
      }
      if (skipped !== undefined) {
        describe.skip(`on ${kind}: ${skipped.reason}`, () => test('not tested', () => {}));
      } else if (refused !== undefined) {
        test(`refuses ${kind} with "method-cannot": ${refused.reason}`, async () => {
          const failure = await propose(makeOffer(kind, offerOptions)).catch((error: unknown) => error);
          expect(failure).toBeInstanceOf(OnebatchError);
          expect((failure as OnebatchError).code).toBe('method-cannot');
        });
      } else {
        describe(`on ${kind}`, () => describeOffer(() => makeOffer(kind, offerOptions), propose));
      }
    }
  });
}

function describeOffer(make: () => Offer, propose: (offer: Offer) => Promise<Proposal>): void {
  const offer = make();
  const { space, batchSize } = offer;
  let running: Promise<Proposal> | undefined;
  const first = (): Promise<Proposal> => {
    running ??= propose(offer);
    return running;
  };

  test('propose(offer) gives exactly batchSize designs inside the space', async () => {
    const { designs } = await first();
    expect([designs.rows, designs.columns]).toEqual([batchSize, space.columns.length]);
    expect(designs.values).toHaveLength(batchSize * space.columns.length);
    expect(findBreach(space, designs)).toBeUndefined();
  });

  test('propose(offer) leaves the offer as it was', async () => {
    const { designs } = await first();
    const { space: visibleSpace, designs: visible, scores } = make();
    expect(offer.space).toEqual(visibleSpace);
    expect(offer.designs).toEqual(visible);
    expect(offer.scores).toEqual(scores);
    expect(designs.values.buffer).not.toBe(offer.designs.values.buffer);
  });

  test('propose(offer) gives the same proposal again from the same stream', async () => {
    const again = await propose({ ...make(), stream: openStream(offer.stream.path) });
    expect(again).toEqual(await first());
  });

  test('believed and spread, where given, are one finite number a design, and no spread is negative', async () => {
    const { believed, spread } = await first();
    if (believed !== undefined) expectFinite(believed, batchSize);
    if (spread !== undefined) {
      expectFinite(spread, batchSize);
      expect(spread.every((sd) => sd >= 0)).toBe(true);
    }
  });

  test('trace, where given, goes up in steps and holds designs inside the space with finite beliefs', async () => {
    const { trace = [] } = await first();
    let last = -1;
    for (const { step, believed, designs } of trace) {
      expect(step).toBeGreaterThan(last);
      last = step;
      expect(designs.rows).toBeGreaterThan(0);
      expect(designs.columns).toBe(space.columns.length);
      expect(findBreach(space, designs)).toBeUndefined();
      expectFinite(believed, designs.rows);
    }
  });
}

function expectFinite(values: Float64Array, length: number): void {
  expect(values).toBeInstanceOf(Float64Array);
  expect(values).toHaveLength(length);
  expect(values.every(Number.isFinite)).toBe(true);
}

/** Paths of settings without a description; an object of settings is looked into instead. */
function undescribed(schema: z.ZodObject, path = ''): string[] {
  return Object.entries(schema.shape).flatMap(([key, field]) => {
    const inner = unwrap(field as z.ZodType);
    if (inner instanceof z.ZodObject) return undescribed(inner, `${path}${key}.`);
    return (field as z.ZodType).description?.trim() ? [] : [`${path}${key}`];
  });
}

function unwrap(schema: z.ZodType): z.ZodType {
  const wrapped = schema instanceof z.ZodDefault || schema instanceof z.ZodPrefault;
  return wrapped ? unwrap(schema.unwrap() as z.ZodType) : schema;
}
