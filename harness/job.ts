import type { MethodReference } from './catalogue.js';
import type { Offer, Proposal } from './method.js';
import type { Settings } from './plan/plan.js';

/** What a worker is told: which method to run on which offer. Plain data that can be posted to a thread. */
export interface MethodJob {
  readonly method: MethodReference;
  readonly settings: Settings;
  readonly backend: string;
  readonly offer: Omit<Offer, 'stream'> & { readonly streamPath: string };
}

/** What a worker answers. A method that throws is an answer too. */
export type MethodAnswer =
  | { readonly kind: 'proposed'; readonly proposal: Proposal; readonly seconds: number }
  | { readonly kind: 'threw'; readonly reason: string; readonly seconds: number };
