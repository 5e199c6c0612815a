/** One step of an elimination: `site` is maximized away, for every combination of letters of `others`. */
export interface EliminationStep {
  readonly site: number;
  /** Sites that share a factor, or a table left by an earlier step, with `site` and are still there; ascending. */
  readonly others: readonly number[];
}

/**
 * Chooses the order in which sites are maximized away: always the one with the fewest others, the lowest-numbered of
 * equals (the minimum-degree rule; Bertelè & Brioschi 1972).
 *
 * `scopes` names the sites of each factor. Returns `undefined` when the order needs more than `workLimit` table
 * look-ups in total, where a step needs (tables that hold its site) · alphabet^(1 + others).
 */
export function planElimination(
  sites: number,
  alphabet: number,
  scopes: readonly (readonly number[])[],
  workLimit: number,
): EliminationStep[] | undefined {
  const neighbours = Array.from({ length: sites }, () => new Set<number>());
  const tables = Array.from({ length: sites }, () => new Set<number>());
  const held: (readonly number[])[] = [];
  const addTable = (scope: readonly number[]): void => {
    for (const site of scope) {
      tables[site]!.add(held.length);
      for (const other of scope) if (other !== site) neighbours[site]!.add(other);
    }
    held.push(scope);
  };
  for (const scope of scopes) addTable(scope);

  const left = new Set(Array.from({ length: sites }, (_, i) => i));
  const steps: EliminationStep[] = [];
  let work = 0;
  while (left.size > 0) {
    let site = -1;
    for (const candidate of left) {
      if (site < 0 || neighbours[candidate]!.size < neighbours[site]!.size) site = candidate;
    }
    const others = [...neighbours[site]!].sort((a, b) => a - b);
    work += tables[site]!.size * alphabet ** (1 + others.length);
    if (work > workLimit) return undefined;
    steps.push({ site, others });
    left.delete(site);
    for (const table of tables[site]!) for (const other of held[table]!) tables[other]!.delete(table);
    for (const other of others) neighbours[other]!.delete(site);
    if (others.length > 0) addTable(others);
  }
  return steps;
}
