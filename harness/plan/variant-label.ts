/** One setting with the value that a variant gives it. */
export interface ChosenValue {
  readonly path: readonly string[];
  readonly value: unknown;
}

/** Longest label that says its settings: it names files too. */
const longest = 96;

/**
 * Labels of a sweep's variants, such as `firm(caution.target=0.5,surrogate.width=32)`: unique, of the signs that labels
 * may hold. Where that would be too long or the same twice, variants are numbered in their order: `firm(3)`.
 */
export function labelVariants(method: string, variants: readonly (readonly ChosenValue[])[]): string[] {
  const labels = variants.map((choice) => {
    const words = choice.map(({ path, value }) => `${path.map(writeWord).join('.')}=${writeValue(value)}`);
    return `${method}(${words.join(',')})`;
  });
  const fit = new Set(labels).size === labels.length && labels.every((label) => label.length <= longest);
  return fit ? labels : variants.map((_, i) => `${method}(${i + 1})`);
}

function writeValue(value: unknown): string {
  if (Array.isArray(value)) return `(${value.map(writeValue).join(',')})`;
  if (typeof value !== 'object' || value === null) return writeWord(String(value));
  const words = Object.entries(value).map(([key, inner]) => `${writeWord(key)}=${writeValue(inner)}`);
  return `(${words.join(',')})`;
}

function writeWord(word: string): string {
  return word.replace(/[^\w.+-]/g, '-');
}
