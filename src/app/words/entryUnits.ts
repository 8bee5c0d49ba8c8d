import { LENGTH_UNITS } from '../../tally/units.ts';
import type { EntryUnit } from '../parts/NumberEntry.tsx';

/** Units in which heights, lengths and winds are typed. Base units: metre, metre a second, degree. */
export const LENGTHS: readonly [EntryUnit, EntryUnit] = [
  { symbol: 'm', name: 'metres', factor: LENGTH_UNITS.m.factor },
  { symbol: 'ft', name: 'feet', factor: LENGTH_UNITS.foot.factor },
];
export const SMALL_LENGTHS: readonly [EntryUnit, EntryUnit] = [
  { symbol: 'cm', name: 'centimetres', factor: 0.01 },
  { symbol: 'mm', name: 'millimetres', factor: 0.001 },
];
/** The international knot is 1,852 m an hour by definition. */
export const WINDS: readonly [EntryUnit, EntryUnit] = [
  { symbol: 'm/s', name: 'metres a second', factor: 1 },
  { symbol: 'kn', name: 'knots', factor: LENGTH_UNITS.nauticalMile.factor / 3600 },
];
export const DEGREES: readonly [EntryUnit] = [{ symbol: '°', name: 'degrees', factor: 1 }];
export const MILLIMETRES: readonly [EntryUnit] = [{ symbol: 'mm', name: 'millimetres', factor: 1 }];

/** Steps of − and +: about a tenth of the value, on round figures. */
export function roundStep(value: number): number {
  const size = Math.max(1e-3, Math.abs(value));
  const decade = 10 ** Math.floor(Math.log10(size));
  return size / decade < 5 ? decade / 10 : decade / 2;
}
