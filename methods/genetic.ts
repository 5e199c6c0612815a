import { noCaution } from './cautions/none.js';
import { compose } from './compose.js';
import { genetic as search } from './searches/genetic.js';
import { networkEnsembleSurrogate } from './surrogates/network-surrogates.js';

/** A genetic algorithm on the mean of a network ensemble. */
export const genetic = compose({
  name: 'genetic',
  description: 'a network ensemble climbed by mutation and crossover of designs',
  source: 'Holland 1975; Goldberg 1989',
  surrogate: networkEnsembleSurrogate,
  search,
  caution: noCaution,
});
