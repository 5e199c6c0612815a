import { z } from 'zod';
import { type Matrix, rowView } from '../../harness/designs.js';
import { type Conservatism, defineSurrogate, type Model, type Surrogate } from '../../methods/parts.js';

/** What a stub surrogate can do. */
export interface StubAbilities {
  readonly spread?: boolean;
  readonly gradient?: boolean;
  readonly conservative?: boolean;
}

/** How a stub surrogate was fitted. */
export interface Fit {
  readonly settings: Record<string, unknown>;
  readonly conservatism?: Conservatism;
  readonly streamPath: string;
}

/**
 * A model without learning: mean = first feature · 10, spread = first feature (at least 0); its gradient is that of
 * the bound, by hand.
 */
export function stubModel({ spread = true, gradient = true }: StubAbilities = {}): Model {
  const first = (x: Matrix, factor: number) =>
    Float64Array.from({ length: x.rows }, (_, i) => factor * rowView(x, i)[0]!);
  return {
    predict: (x) => ({ mean: first(x, 10), ...(spread ? { spread: first(x, 1) } : {}) }),
    ...(gradient
      ? {
          gradient: (x: Matrix, spreadWeight: number) => ({
            ...x,
            values: x.values.map((_, k) => (k % x.columns === 0 ? 10 - spreadWeight : 0)),
          }),
        }
      : {}),
  };
}

/** A surrogate that fits the stub model, and writes down how it was asked to. */
export function stubSurrogate(abilities: StubAbilities = {}): Surrogate & { readonly fits: Fit[] } {
  const fits: Fit[] = [];
  const surrogate = defineSurrogate({
    name: 'stub',
    description: 'a stub',
    source: 'none',
    settings: z.strictObject({
      depth: z.int().default(3).describe('how deep'),
      speed: z.number().default(1).describe('how fast'),
    }),
    fit(_table, settings, stream) {
      fits.push({ settings, streamPath: stream.path });
      return stubModel(abilities);
    },
    ...(abilities.conservative
      ? {
          fitConservatively(_table, settings, conservatism, stream) {
            fits.push({ settings, conservatism, streamPath: stream.path });
            return stubModel(abilities);
          },
        }
      : {}),
  });
  return { ...(surrogate as unknown as Surrogate), fits };
}
