import { noCaution } from './cautions/none.js';
import { compose } from './compose.js';
import { cmaEs as search } from './searches/cma-es.js';
import { networkEnsembleSurrogate } from './surrogates/network-surrogates.js';

/** CMA-ES on the mean of a network ensemble. */
export const cmaEs = compose({
  name: 'cma-es',
  description: 'a network ensemble climbed by CMA-ES from the best visible designs',
  source: 'Hansen 2016',
  surrogate: networkEnsembleSurrogate,
  search,
  caution: noCaution,
});
