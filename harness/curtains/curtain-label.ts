import type { CurtainSpec, RegionSpec, WhereSpec } from './curtain-spec.js';

/**
 * The one-line text by which a curtain is named in ledgers and tables, such as `ceiling=0.5 thin=200 noise=0.05`;
 * `open` when nothing is hidden and nothing noisy. It does not depend on the order of keys, and two specs with the
 * same text are the same curtain.
 */
export function curtainLabel(spec: CurtainSpec): string {
  const { ceiling, region, family, thin, noise } = spec;
  const parts: string[] = [];
  if (ceiling !== undefined) parts.push(`ceiling=${ceiling}`);
  if (region !== undefined) parts.push(`region=${regionText(region)}`);
  if (family !== undefined) parts.push(`family=${family.parents}x${family.changes}`);
  if (thin !== undefined) parts.push(`thin=${thin}`);
  if (noise !== undefined && noise > 0) parts.push(`noise=${noise}`);
  return parts.length > 0 ? parts.join(' ') : 'open';
}

function regionText(region: RegionSpec): string {
  if ('where' in region) return whereText(region.where);
  return `${region.columns}x${region.share}${region.around === 'optimum' ? '@optimum' : ''}`;
}

function whereText(where: WhereSpec): string {
  return Object.keys(where)
    .sort()
    .map((name) => `${plain(name)}:${boundsText(where[name]!)}`)
    .join(';');
}

function boundsText(bounds: WhereSpec[string]): string {
  const numbers = bounds.filter((bound) => typeof bound === 'number');
  if (bounds.length === 2 && numbers.length === 2) return numbers.join('..');
  return [...new Set(bounds.map(String))].sort().map(plain).join('/');
}

/** The text as it is when it is one plain word, else in quotes. */
function plain(text: string): string {
  return /^[\w-]+$/.test(text) ? text : JSON.stringify(text);
}
