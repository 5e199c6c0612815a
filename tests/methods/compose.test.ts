import { describe, expect, test } from 'vitest';
import { z } from 'zod';
import { rowView } from '../../harness/designs.js';
import { encode, makeEncoding } from '../../harness/encoding.js';
import { lowerBound } from '../../methods/cautions/lower-bound.js';
import { noCaution } from '../../methods/cautions/none.js';
import { type Composition, compose } from '../../methods/compose.js';
import { composeParts } from '../../methods/index.js';
import { type Caution, defineSearch, type Search } from '../../methods/parts.js';
import { bestVisible } from '../../methods/table.js';
import { describeMethodContract, makeOffer } from './contract.js';
import { stubModel, stubSurrogate } from './stub-parts.js';

const search = defineSearch({
  name: 'stay',
  description: 'proposes the best visible designs',
  source: 'none',
  settings: z.strictObject({
    steps: z.int().default(10).describe('steps'),
    trace: z.boolean().default(false).describe('whether to keep a trace'),
  }),
  climb(objective, table, batchSize, { trace }) {
    const designs = bestVisible(table, batchSize);
    const { mean } = objective.believe(encode(table.encoding, designs));
    return { designs, ...(trace ? { trace: [{ step: 0, believed: mean, designs }] } : {}) };
  },
}) as unknown as Search;

const parts = {
  name: 'made-up',
  description: 'a method for this test',
  source: 'none',
  surrogate: stubSurrogate(),
  search,
  caution: noCaution as unknown as Caution,
} satisfies Composition;

describeMethodContract(compose(parts));

describe('compose(composition).settings', () => {
  const defaults = {
    surrogate: { depth: 3, speed: 1 },
    search: { steps: 10, trace: false },
    caution: {},
  };

  test('holds the settings of the three parts, with their defaults', () => {
    const { settings } = compose(parts);
    expect(settings.parse({})).toEqual(defaults);
    expect(settings.parse({ surrogate: { speed: 7 } })).toEqual({
      ...defaults,
      surrogate: { depth: 3, speed: 7 },
    });
  });

  test('takes the composition’s own defaults where it has any, and keeps what the setting means', () => {
    const { settings } = compose({ ...parts, defaults: { search: { steps: 20 }, surrogate: { depth: 5 } } });
    const own = { surrogate: { depth: 5, speed: 1 }, search: { steps: 20, trace: false }, caution: {} };
    expect(settings.parse({})).toEqual(own);
    expect(settings.parse({ search: { steps: 2 } })).toEqual({ ...own, search: { steps: 2, trace: false } });
    expect(settings.safeParse({ search: { steps: 2.5 } }).success).toBe(false);
    expect(parts.search.settings.parse({})).toEqual(defaults.search);
  });

  test.each([{ depth: 3 }, { surrogate: { width: 3 } }, { search: { step: 1 } }, { caution: { weight: 1 } }])(
    'refuses a key that no part has: %o',
    (wrong) => {
      for (const own of [{}, { search: { steps: 20 } }]) {
        expect(compose({ ...parts, defaults: own }).settings.safeParse(wrong).success).toBe(false);
      }
    },
  );

  test('refuses to be made with a default for a setting that its part does not have', () => {
    expect(() => compose({ ...parts, defaults: { search: { stepz: 1 } } })).toThrow(RangeError);
  });
});

describe('compose(composition).propose(offer, settings)', () => {
  const offer = makeOffer('mixed');
  const x = (designs: typeof offer.designs) => encode(makeEncoding(offer.space), designs);

  test('believes what the model predicts of the batch, with its spread, whatever the caution took off', async () => {
    const cautious = compose({ ...parts, caution: lowerBound as unknown as Caution });
    const settings = cautious.settings.parse({ caution: { spreads: 5 } });
    const { designs, believed, spread } = await cautious.propose(offer, settings);
    expect(designs).toEqual(bestVisible(offer, offer.batchSize));
    const predicted = stubModel().predict(x(designs));
    expect(believed).toEqual(predicted.mean);
    expect(spread).toEqual(predicted.spread);
    expect(believed![0]).toBeCloseTo((10 * (rowView(designs, 0)[0]! - 20)) / 70, 12);
  });

  test('says nothing of a spread or a trace that parts don’t have', async () => {
    const method = compose({ ...parts, surrogate: stubSurrogate({ spread: false }) });
    const quiet = await method.propose(offer, method.settings.parse({}));
    expect(Object.keys(quiet).sort()).toEqual(['believed', 'designs']);
    const traced = await method.propose(offer, method.settings.parse({ search: { trace: true } }));
    expect(traced.trace).toHaveLength(1);
  });

  test('hands each part its own settings, and the model a stream apart from the search’s', async () => {
    const surrogate = stubSurrogate();
    let searchPath = '';
    const watched: Search = {
      ...search,
      climb(objective, table, batchSize, settings, stream) {
        searchPath = stream.path;
        expect(settings).toEqual({ steps: 4, trace: false });
        return search.climb(objective, table, batchSize, settings, stream);
      },
    };
    const method = compose({ ...parts, surrogate, search: watched });
    await method.propose(offer, method.settings.parse({ surrogate: { depth: 9 }, search: { steps: 4 } }));
    const [fit] = surrogate.fits;
    expect(fit!.settings).toEqual({ depth: 9, speed: 1 });
    expect(fit!.streamPath.startsWith(offer.stream.path.slice(0, -1))).toBe(true);
    expect(searchPath).not.toBe(fit!.streamPath);
    expect(searchPath).not.toBe('');
  });
});

describe('combinations that a plan can name but that can’t work', () => {
  const quick = { surrogate: { steps: 1, width: 2 } };
  test.each([
    ['network', 'gradient-ascent', 'lower-bound', quick],
    ['network', 'genetic', 'lower-bound', quick],
    ['ridge', 'gradient-ascent', 'conservative-training', {}],
    ['gaussian-process', 'genetic', 'conservative-training', {}],
  ])('%s + %s + %s is refused with "method-cannot"', async (surrogate, searchName, caution, settings) => {
    const method = composeParts({ surrogate, search: searchName, caution });
    const attempt = async () => method.propose(makeOffer('mixed'), method.settings.parse(settings));
    await expect(attempt()).rejects.toMatchObject({ name: 'OnebatchError', code: 'method-cannot' });
  });
});
