import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type CurtainSpec, curtainSchema, drawCurtain } from '../../harness/curtain.js';
import { copyMatrix, type Designs, rowView, takeRows } from '../../harness/designs.js';
import { quantile } from '../../harness/quantile.js';
import { rootStream, type Stream } from '../../harness/random.js';
import { makeSpace, sequenceSpace } from '../../harness/space.js';
import type { Task } from '../../harness/task.js';
import { arbitrarySpace, runs } from './arbitrary-space.js';
import { criticalDeviation } from './chi-square.js';
import { toyTask } from './toy-task.js';

const open: CurtainSpec = {};

/** Tasks on all kinds of spaces, with and without ties, a seed and a pool size. */
const arbitraryCase = fc
  .record({
    space: arbitrarySpace(),
    seed: fc.nat(),
    step: fc.constantFrom(0, 0.5),
    rows: fc.integer({ min: 20, max: 80 }),
  })
  .map(({ space, seed, step, rows }) => ({ task: toyTask(space, rootStream(seed), step), seed, rows }));

const share = fc.double({ min: 0.1, max: 0.9, noNaN: true });

/** Curtains of every combination of parts, mild enough to leave rows in most pools. */
const arbitrarySpec: fc.Arbitrary<CurtainSpec> = fc.record(
  {
    ceiling: fc.double({ min: 0.5, max: 0.95, noNaN: true }),
    region: fc.record({
      columns: fc.constant(1),
      share: fc.double({ min: 0.1, max: 0.5, noNaN: true }),
      around: fc.constantFrom('random' as const, 'optimum' as const),
    }),
    family: fc.record({ parents: fc.integer({ min: 1, max: 4 }), changes: fc.integer({ min: 1, max: 3 }) }),
    thin: fc.integer({ min: 2, max: 30 }),
    noise: fc.constantFrom(0, 0.1, 1),
  },
  { requiredKeys: [] },
);

const indices = (count: number) => Array.from({ length: count }, (_, i) => i);

/** Draws, or skips the case when the curtain leaves fewer than 2 rows. */
function drawn(task: Task, spec: CurtainSpec, rows: number, seed: number) {
  try {
    return drawCurtain(task, spec, rows, rootStream(seed));
  } catch (error) {
    fc.pre(!/of \d+ pool rows visible/.test(String(error)));
    throw error;
  }
}

describe('drawCurtain(task, {}, rows, stream)', () => {
  test('shows the whole pool, in its order, measured without noise', () => {
    fc.assert(
      fc.property(arbitraryCase, ({ task, seed, rows }) => {
        const { pool, visible, designs, scores, trueScores } = drawCurtain(
          task,
          open,
          rows,
          rootStream(seed),
        );
        expect(visible).toEqual(indices(rows));
        expect(designs).toEqual(pool.designs);
        expect(scores).toEqual(pool.scores);
        expect(trueScores).toEqual(pool.scores);
      }),
      runs,
    );
  });
});

describe('any curtain', () => {
  test('shows at least 2 rows of the pool in its order, with their designs and true scores', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, spec) => {
        const { pool, visible, designs, scores, trueScores } = drawn(task, spec, rows, seed);
        expect(visible.length).toBeGreaterThanOrEqual(2);
        expect(visible).toEqual([...new Set(visible)].sort((a, b) => a - b));
        expect(visible.every((i) => i >= 0 && i < rows)).toBe(true);
        expect(designs).toEqual(takeRows(pool.designs, visible));
        expect(Array.from(trueScores)).toEqual(visible.map((i) => pool.scores[i]!));
        expect(scores).toHaveLength(visible.length);
        if (!spec.noise) expect(scores).toEqual(trueScores);
      }),
      { ...runs, numRuns: 200 },
    );
  });

  test('is the same for the same stream and any order of keys, and depends on no draw made before', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, spec) => {
        const first = drawn(task, spec, rows, seed);
        const used = rootStream(seed);
        used.normal();
        const turned = Object.fromEntries(Object.entries(spec).reverse()) as CurtainSpec;
        expect(drawCurtain(task, turned, rows, used)).toEqual(first);
      }),
      runs,
    );
  });

  test('shows what each of its parts shows alone, ceiling and region on a pool with the same family', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, { thin: _, ...spec }) => {
        const { family } = spec;
        const together = drawn(task, spec, rows, seed).visible;
        const familyPart = family === undefined ? {} : { family };
        const parts = Object.entries(spec).map(
          ([key, part]) => drawn(task, { ...familyPart, [key]: part }, rows, seed).visible,
        );
        expect(together).toEqual(indices(rows).filter((i) => parts.every((visible) => visible.includes(i))));
      }),
      { ...runs, numRuns: 200 },
    );
  });

  test('gives the pool of the task and family alone', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, spec) => {
        const { pool } = drawn(task, spec, rows, seed);
        const { family } = spec;
        const bare = family === undefined ? {} : { family };
        expect(pool).toEqual(drawCurtain(task, bare, rows, rootStream(seed)).pool);
      }),
      runs,
    );
  });

  test('draws each part from a child stream of its own, and nothing from the stream it is given', () => {
    const task = toyTask(sequenceSpace(6, ['A', 'B', 'C']), rootStream(1));
    const root = rootStream(2);
    const asked: string[] = [];
    const forbidden = () => {
      throw new Error('drew from the parent');
    };
    const watched: Stream = {
      path: root.path,
      uniform: forbidden,
      below: forbidden,
      normal: forbidden,
      split: (...keys) => {
        asked.push(keys.join(' '));
        return root.split(...keys);
      },
    };
    const spec = curtainSchema.parse({ ceiling: 0.9, region: {}, family: {}, thin: 5, noise: 1 });
    const everything = drawCurtain(task, spec, 100, watched);
    expect(asked.sort()).toEqual(['family', 'noise', 'pool', 'region', 'thin']);
    expect(everything).toEqual(drawCurtain(task, spec, 100, root));
  });

  test('leaves spec and optimum as they were', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, spec) => {
        const before = structuredClone({ spec, optimum: task.optimum, space: task.space });
        drawn(task, spec, rows, seed);
        expect({ spec, optimum: task.optimum, space: task.space }).toEqual(before);
      }),
      runs,
    );
  });

  test('shows designs of its own: writing to them does not reach the pool', () => {
    const task = toyTask(sequenceSpace(4, ['A', 'B']), rootStream(1));
    const { pool, designs, scores, trueScores } = drawCurtain(task, open, 20, rootStream(1));
    const before = { designs: copyMatrix(pool.designs), scores: pool.scores.slice() };
    for (const values of [designs.values, scores, trueScores]) values.fill(-1);
    expect({ designs: pool.designs, scores: pool.scores }).toEqual(before);
  });

  test('is refused with what it left when fewer than 2 rows remain visible', () => {
    const task = toyTask(makeSpace([{ kind: 'continuous', name: 'x', low: 0, high: 1 }]), rootStream(1));
    expect(() => drawCurtain(task, { ceiling: 0.05 }, 20, rootStream(1))).toThrow(
      expect.objectContaining({
        code: 'bad-settings',
        message: expect.stringMatching(
          /^the curtain ceiling=0.05 leaves 1 of 20 pool rows visible, .*larger pool/,
        ),
      }),
    );
    expect(drawCurtain(task, { ceiling: 0.1 }, 20, rootStream(1)).visible).toHaveLength(2);
  });
});

describe('ceiling', () => {
  test('shows exactly the rows whose true score is below the quantile of the pool', () => {
    fc.assert(
      fc.property(arbitraryCase, share, fc.constantFrom(0, 2), ({ task, seed, rows }, ceiling, noise) => {
        const { pool, visible } = drawn(task, { ceiling, noise }, rows, seed);
        const limit = quantile(pool.scores, ceiling);
        expect(visible).toEqual(indices(rows).filter((i) => pool.scores[i]! < limit));
      }),
      { ...runs, numRuns: 200 },
    );
  });

  test('shows ⌈(n − 1)q⌉ of n rows when no two scores are equal', () => {
    const task = toyTask(makeSpace([{ kind: 'continuous', name: 'x', low: 0, high: 1 }]), rootStream(1));
    // Quantiles of 32nds, so that (n − 1)q is exact.
    fc.assert(
      fc.property(
        fc.nat(),
        fc.integer({ min: 65, max: 200 }),
        fc.integer({ min: 1, max: 31 }),
        (seed, rows, k) => {
          const { visible } = drawCurtain(task, { ceiling: k / 32 }, rows, rootStream(seed));
          expect(visible).toHaveLength(Math.ceil(((rows - 1) * k) / 32));
        },
      ),
      runs,
    );
  });
});

describe('family', () => {
  const distance = (designs: Designs, a: number, b: number) =>
    rowView(designs, a).filter((value, j) => value !== rowView(designs, b)[j]).length;

  test('shows parents, their variants and whatever else lies within the changes, and nothing more', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, spec) => {
        const family = spec.family ?? { parents: 2, changes: 1 };
        const { pool, visible } = drawCurtain(task, { family }, rows, rootStream(seed));
        expect(pool.parents).toHaveLength(family.parents);
        const near = (i: number) =>
          pool.parents.some((parent) => distance(pool.designs, i, parent) <= family.changes);
        expect(visible).toEqual(indices(rows).filter(near));
        const variants = indices(rows).slice(Math.ceil(rows / 2));
        expect([...pool.parents, ...variants].every((i) => visible.includes(i))).toBe(true);
      }),
      { ...runs, numRuns: 200 },
    );
  });
});

describe('thin', () => {
  test('shows that many of the rows left, all when fewer are left', () => {
    fc.assert(
      fc.property(
        arbitraryCase,
        arbitrarySpec,
        fc.integer({ min: 2, max: 60 }),
        ({ task, seed, rows }, { thin: _, ...rest }, thin) => {
          const left = drawn(task, rest, rows, seed).visible;
          const { visible } = drawCurtain(task, { ...rest, thin }, rows, rootStream(seed));
          expect(visible).toHaveLength(Math.min(thin, left.length));
          expect(visible.every((i) => left.includes(i))).toBe(true);
        },
      ),
      { ...runs, numRuns: 200 },
    );
  });

  test('keeps under a stricter curtain every row that it kept before and that is still left', () => {
    fc.assert(
      fc.property(
        arbitraryCase,
        share,
        fc.integer({ min: 2, max: 30 }),
        ({ task, seed, rows }, ceiling, thin) => {
          const wide = drawCurtain(task, { thin }, rows, rootStream(seed)).visible;
          const left = new Set(drawn(task, { ceiling }, rows, seed).visible);
          const strict = drawCurtain(task, { ceiling, thin }, rows, rootStream(seed)).visible;
          expect(wide.filter((i) => left.has(i)).every((i) => strict.includes(i))).toBe(true);
        },
      ),
      runs,
    );
  });

  test('keeps every row equally often', () => {
    const task = toyTask(sequenceSpace(3, ['A', 'B']), rootStream(1));
    const kept = new Array<number>(20).fill(0);
    const draws = 2000;
    for (let seed = 0; seed < draws; seed++) {
      for (const i of drawCurtain(task, { thin: 5 }, 20, rootStream(seed)).visible) kept[i]! += 1;
    }
    // Each count is binomial(2000, 1/4); false-alarm level 1e-6 each.
    const deviation = Math.sqrt(draws * 0.25 * 0.75);
    for (const count of kept) expect(Math.abs(count - draws / 4)).toBeLessThan(criticalDeviation * deviation);
  });
});

describe('noise', () => {
  const task = toyTask(sequenceSpace(6, ['A', 'B', 'C']), rootStream(1));

  test.each([0.05, 0.5, 2])(
    '%d is the deviation of what is added, as a share of that of the pool',
    (noise) => {
      const rows = 20_000;
      const { pool, scores, trueScores } = drawCurtain(task, { noise }, rows, rootStream(3));
      const z = scores.map((score, i) => (score - trueScores[i]!) / (noise * pool.deviation));
      const mean = z.reduce((sum, value) => sum + value, 0) / rows;
      const square = z.reduce((sum, value) => sum + value * value, 0) / rows;
      const centre = pool.scores.reduce((sum, score) => sum + score, 0) / rows;
      const along =
        z.reduce((sum, value, i) => sum + value * (trueScores[i]! - centre), 0) / pool.deviation / rows;
      // Standard errors for n standard normals: 1/√n for the mean and the correlation with the score, √(2/n) for the
      // mean square.
      expect(Math.abs(mean) * Math.sqrt(rows)).toBeLessThan(criticalDeviation);
      expect(Math.abs(square - 1) * Math.sqrt(rows / 2)).toBeLessThan(criticalDeviation);
      expect(Math.abs(along) * Math.sqrt(rows)).toBeLessThan(criticalDeviation);
    },
  );

  test('is the same on a pool row whatever else is hidden', () => {
    fc.assert(
      fc.property(arbitraryCase, arbitrarySpec, ({ task, seed, rows }, spec) => {
        const { family } = spec;
        const noisy = { ...(family === undefined ? {} : { family }), noise: 0.3 };
        const full = drawCurtain(task, noisy, rows, rootStream(seed));
        const measured = new Map(full.visible.map((i, k) => [i, full.scores[k]!]));
        const hidden = drawn(task, { ...spec, noise: 0.3 }, rows, seed);
        expect(Array.from(hidden.scores)).toEqual(hidden.visible.map((i) => measured.get(i)));
      }),
      { ...runs, numRuns: 200 },
    );
  });

  test('does not move the ceiling, which goes by true scores', () => {
    const quiet = drawCurtain(task, { ceiling: 0.5 }, 100, rootStream(3));
    expect(drawCurtain(task, { ceiling: 0.5, noise: 5 }, 100, rootStream(3)).visible).toEqual(quiet.visible);
  });
});
