import { OnebatchError } from '../harness/errors.js';
import { suggestion } from '../harness/nearest-word.js';

/**
 * A word that must be one of those known.
 *
 * @throws OnebatchError (`bad-input`) naming the option and the nearest word.
 */
export function oneOf(option: string, word: string, known: readonly string[]): string {
  if (known.includes(word)) return word;
  throw new OnebatchError('bad-input', `${option}: is "${word}"; ${suggestion(word, known)}`);
}

/**
 * A margin as typed; `undefined` where none was.
 *
 * @throws OnebatchError (`bad-input`) for what isn't a number above 0.
 */
export function readMargin(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  const value = /^(\d+\.?\d*|\.\d+)(e-?\d+)?$/i.test(text) ? Number(text) : Number.NaN;
  if (value > 0 && Number.isFinite(value)) return value;
  throw new OnebatchError('bad-input', `--margin: is "${text}", must be a number above 0, such as 0.02`);
}
