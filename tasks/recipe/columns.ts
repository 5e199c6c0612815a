import type { CategoryColumn, ContinuousColumn, IntegerColumn } from '../../harness/space.js';

/** A column without its kind: name, bounds, unit. */
type Dial = readonly [name: string, low: number, high: number, unit: string];

/** Invented but ordinary dials of growing a plant under lamps. */
const continuousDials: readonly Dial[] = [
  ['light', 100, 600, 'µmol/m²/s'],
  ['temperature', 14, 32, '°C'],
  ['nutrients', 0.5, 4, 'mS/cm'],
  ['humidity', 35, 90, '%'],
  ['carbon_dioxide', 400, 1600, 'ppm'],
  ['acidity', 4.5, 7.5, 'pH'],
  ['airflow', 0.1, 1.5, 'm/s'],
  ['red_share', 10, 90, '%'],
];

const integerDials: readonly Dial[] = [
  ['day_length', 8, 20, 'h'],
  ['waterings', 1, 12, 'per day'],
  ['harvest_day', 20, 60, 'd'],
  ['plants', 4, 24, 'per tray'],
];

const choices: readonly string[] = ['cultivar', 'substrate', 'lamp', 'tray'];

/** Continuous column `j` (from 0): a named dial of the recipe, or `dial9` … from 0 to 1 when those run out. */
export function continuousColumn(j: number): ContinuousColumn {
  const [name, low, high, unit] = continuousDials[j] ?? [`dial${j + 1}`, 0, 1, ''];
  return { kind: 'continuous', name, low, high, ...(unit === '' ? {} : { unit }) };
}

/** Integer column `j` (from 0): a named count of the recipe, or `count5` … from 0 to 20 when those run out. */
export function integerColumn(j: number): IntegerColumn {
  const [name, low, high, unit] = integerDials[j] ?? [`count${j + 1}`, 0, 20, ''];
  return { kind: 'integer', name, low, high, ...(unit === '' ? {} : { unit }) };
}

/** Category column `j` (from 0) with levels A, B, …; `levels` is at most 26. */
export function categoryColumn(j: number, levels: number): CategoryColumn {
  return {
    kind: 'category',
    name: choices[j] ?? `choice${j + 1}`,
    levels: Array.from({ length: levels }, (_, level) => String.fromCharCode(65 + level)),
  };
}
