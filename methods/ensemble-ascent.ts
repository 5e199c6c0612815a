import { lowerBound } from './cautions/lower-bound.js';
import { compose } from './compose.js';
import { gradientAscent } from './searches/gradient-ascent.js';
import { networkEnsembleSurrogate } from './surrogates/network-surrogates.js';

/** Several networks, climbed on their mean less a multiple of their disagreement. */
export const ensembleAscent = compose({
  name: 'ensemble-ascent',
  description: 'several networks climbed on their mean minus a multiple of their spread',
  source: 'Lakshminarayanan et al. 2017',
  surrogate: networkEnsembleSurrogate,
  search: gradientAscent,
  caution: lowerBound,
});
