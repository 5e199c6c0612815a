import { noCaution } from './cautions/none.js';
import { compose } from './compose.js';
import { gradientAscent as search } from './searches/gradient-ascent.js';
import { networkSurrogate } from './surrogates/network-surrogates.js';

/** The naive optimizer: one network, trained by plain regression, climbed by its gradient. */
export const gradientAscent = compose({
  name: 'gradient-ascent',
  description: 'one network climbed by its gradient from the best visible designs: the naive optimizer',
  source: 'common practice',
  surrogate: networkSurrogate,
  search,
  caution: noCaution,
});
