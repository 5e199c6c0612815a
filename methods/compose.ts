import { z } from 'zod';
import { encode } from '../harness/encoding.js';
import { defineMethod, type Method, type Proposal } from '../harness/method.js';
import type { Caution, Search, Surrogate } from './parts.js';
import { makeTable } from './table.js';

/** A method as three choices, with its own defaults where they differ from the parts'. */
export interface Composition {
  readonly name: string;
  readonly description: string;
  readonly source: string;
  readonly surrogate: Surrogate;
  readonly search: Search;
  readonly caution: Caution;
  readonly defaults?: {
    readonly surrogate?: Record<string, unknown>;
    readonly search?: Record<string, unknown>;
    readonly caution?: Record<string, unknown>;
  };
}

/**
 * Builds a method from a surrogate, a search and a caution. Its settings are `{surrogate, search, caution}`, each with
 * that part's settings; its belief is what the model predicts of the batch, whatever the caution took off.
 */
export function compose(composition: Composition): Method {
  const { name, description, source, surrogate, search, caution, defaults = {} } = composition;
  const settings = z.strictObject({
    surrogate: withDefaults(surrogate.settings, defaults.surrogate).prefault({}),
    search: withDefaults(search.settings, defaults.search).prefault({}),
    caution: withDefaults(caution.settings, defaults.caution).prefault({}),
  });
  return defineMethod({
    name,
    description,
    source,
    settings,
    async propose(offer, chosen): Promise<Proposal> {
      const table = makeTable(offer);
      const { stream, batchSize } = offer;
      const objective = await caution.prepare(
        surrogate,
        chosen.surrogate,
        table,
        chosen.caution,
        stream.split('model'),
      );
      const climb = await search.climb(objective, table, batchSize, chosen.search, stream.split('search'));
      const { mean, spread } = objective.believe(encode(table.encoding, climb.designs));
      return {
        designs: climb.designs,
        believed: mean,
        ...(spread === undefined ? {} : { spread }),
        ...(climb.trace === undefined ? {} : { trace: climb.trace }),
      };
    },
  });
}

function withDefaults(settings: z.ZodObject, defaults: Record<string, unknown> = {}): z.ZodObject {
  const changed = Object.entries(defaults).map(([key, value]) => {
    const field = settings.shape[key];
    if (field === undefined) throw new RangeError(`no setting "${key}" to give a default`);
    const description = (field as z.ZodType).description ?? '';
    return [key, (field as z.ZodType).default(value).describe(description)];
  });
  return settings.extend(Object.fromEntries(changed));
}
