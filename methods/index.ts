import type { PartsChoice } from '../harness/catalogue.js';
import type { Method } from '../harness/method.js';
import { additive } from './additive.js';
import { conservativeTraining } from './cautions/conservative-training.js';
import { lowerBound } from './cautions/lower-bound.js';
import { noCaution } from './cautions/none.js';
import { cmaEs } from './cma-es.js';
import { compose } from './compose.js';
import { conservative } from './conservative.js';
import { ensembleAscent } from './ensemble-ascent.js';
import { gaussianProcess } from './gaussian-process.js';
import { genetic } from './genetic.js';
import { gradientAscent } from './gradient-ascent.js';
import { jitter } from './jitter.js';
import type { Caution, Search, Surrogate } from './parts.js';
import { repeatBest } from './repeat-best.js';
import { cmaEs as cmaEsSearch } from './searches/cma-es.js';
import { genetic as geneticSearch } from './searches/genetic.js';
import { gradientAscent as gradientAscentSearch } from './searches/gradient-ascent.js';
import { gaussianProcessSurrogate } from './surrogates/gaussian-process.js';
import { networkEnsembleSurrogate, networkSurrogate } from './surrogates/network-surrogates.js';
import { ridgeSurrogate } from './surrogates/ridge.js';

/** All methods that plans can name, plainest first. */
export const methods: readonly Method[] = [
  repeatBest,
  jitter,
  additive,
  gradientAscent,
  ensembleAscent,
  conservative,
  gaussianProcess,
  cmaEs,
  genetic,
];

export const surrogates: readonly Surrogate[] = [
  ridgeSurrogate,
  networkSurrogate,
  networkEnsembleSurrogate,
  gaussianProcessSurrogate,
];

export const searches: readonly Search[] = [gradientAscentSearch, cmaEsSearch, geneticSearch];

export const cautions: readonly Caution[] = [noCaution, lowerBound, conservativeTraining];

/** A method made of three parts by their names. Throws RangeError for a name that no part has. */
export function composeParts(choice: PartsChoice): Method {
  const name = `${choice.surrogate}+${choice.search}+${choice.caution}`;
  return compose({
    name,
    description: 'a combination that the plan names',
    source: 'the plan',
    surrogate: byName(surrogates, choice.surrogate),
    search: byName(searches, choice.search),
    caution: byName(cautions, choice.caution),
  });
}

function byName<Part extends { readonly name: string }>(parts: readonly Part[], name: string): Part {
  const part = parts.find((candidate) => candidate.name === name);
  if (part === undefined) throw new RangeError(`no part is named "${name}"`);
  return part;
}
