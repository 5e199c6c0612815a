import { conservativeTraining } from './cautions/conservative-training.js';
import { compose } from './compose.js';
import { gradientAscent } from './searches/gradient-ascent.js';
import { networkSurrogate } from './surrogates/network-surrogates.js';

/** A network trained to predict low where its own ascent would lead, then climbed for as many steps. */
export const conservative = compose({
  name: 'conservative',
  description: 'a network held down where its own ascent leads, then climbed by its gradient',
  source: 'conservative objective models, ICML 2021',
  surrogate: networkSurrogate,
  search: gradientAscent,
  caution: conservativeTraining,
  defaults: { search: { steps: 20 } },
});
