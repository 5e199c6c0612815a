import { z } from 'zod';
import { takeRows } from '../../harness/designs.js';
import { OnebatchError } from '../../harness/errors.js';
import { defineCaution, type Prediction } from '../parts.js';

/** Climbs what the model is fairly sure of: its mean less a multiple of its spread. */
export const lowerBound = defineCaution({
  name: 'lower-bound',
  description: 'climb the predicted mean minus a multiple of the predicted spread',
  source: 'Lakshminarayanan et al. 2017; lower confidence bounds: common practice',
  settings: z.strictObject({
    spreads: z.number().min(0).default(1).describe('how many spreads to take off the mean'),
  }),
  async prepare(surrogate, surrogateSettings, table, { spreads }, stream) {
    const model = await surrogate.fit(table, surrogateSettings, stream);
    if (model.predict(takeRows(table.x, [0])).spread === undefined) {
      throw new OnebatchError(
        'method-cannot',
        `caution "lower-bound" needs a surrogate with a spread; "${surrogate.name}" has none, use "network-ensemble"`,
      );
    }
    const bound = ({ mean, spread }: Prediction) => mean.map((m, i) => m - spreads * spread![i]!);
    const { gradient } = model;
    return {
      value: (x) => bound(model.predict(x)),
      believe: (x) => model.predict(x),
      ...(gradient === undefined ? {} : { gradient: (x) => gradient.call(model, x, spreads) }),
    };
  },
});
