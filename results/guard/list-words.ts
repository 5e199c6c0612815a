/** The first entries of a list in one line, and how many more there are. */
export function listSome(entries: readonly string[], separator = '; ', most = 4): string {
  const more = entries.length - most;
  return [...entries.slice(0, most), ...(more > 0 ? [`and ${more} more`] : [])].join(separator);
}

/** A count with its noun: 1 seed, 2 seeds. */
export function countOf(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}
