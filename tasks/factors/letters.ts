/**
 * The letters of a sequence task's alphabet: 0 and 1 for two, bases for three and four, else the first of the 20
 * one-letter amino acid codes in alphabetical order. Only names: no letter is like another. `alphabet` is 2 … 20.
 */
export function lettersOf(alphabet: number): string[] {
  if (alphabet === 2) return ['0', '1'];
  return [...(alphabet <= 4 ? 'ACGT' : 'ACDEFGHIKLMNPQRSTVWY')].slice(0, alphabet);
}
