import { closest, distance } from 'fastest-levenshtein';

/** The known word that a misspelt one was probably meant to be, or `undefined` when none is near. */
export function nearestWord(word: string, known: readonly string[]): string | undefined {
  if (known.length === 0) return undefined;
  const candidate = closest(word.toLowerCase(), [...known]);
  const tolerance = Math.max(2, Math.ceil(candidate.length / 3));
  return distance(word.toLowerCase(), candidate.toLowerCase()) <= tolerance ? candidate : undefined;
}

/** The end of a message about an unknown word: what was probably meant, and what there is. */
export function suggestion(word: string, known: readonly string[]): string {
  if (known.length === 0) return 'there is none';
  const near = nearestWord(word, known);
  const list = known.join(', ');
  return near === undefined ? `there is: ${list}` : `did you mean "${near}"? There is: ${list}`;
}
