import type { Catalogue } from '../harness/catalogue.js';
import { cautions, composeParts, methods, searches, surrogates } from '../methods/index.js';
import { tasks } from '../tasks/index.js';

/** Everything that the program's own plans can name. */
export const catalogue: Catalogue = { tasks, methods, surrogates, searches, cautions, compose: composeParts };
