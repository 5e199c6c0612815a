import { z } from 'zod';
import { defineCaution, type Model, type Objective } from '../parts.js';

/** No caution: the search climbs the model's mean. */
export const noCaution = defineCaution({
  name: 'none',
  description: 'climb the predicted mean as it is',
  source: 'common practice',
  settings: z.strictObject({}),
  async prepare(surrogate, surrogateSettings, table, _settings, stream) {
    return meanObjective(await surrogate.fit(table, surrogateSettings, stream));
  },
});

/** The objective that trusts the model's mean. */
export function meanObjective(model: Model): Objective {
  const { gradient } = model;
  return {
    value: (x) => model.predict(x).mean,
    believe: (x) => model.predict(x),
    ...(gradient === undefined ? {} : { gradient: (x) => gradient.call(model, x, 0) }),
  };
}
