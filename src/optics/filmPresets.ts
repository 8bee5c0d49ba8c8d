import { air } from './materials/air.ts';
import { bubbleMix, soapSolution } from './materials/aqueous.ts';
import {
  diesel,
  heavyCrude,
  kerosene,
  lightCrude,
  lubricatingOil,
  mediumCrude,
  petrol,
  vegetableOil,
} from './materials/oils.ts';
import { crownGlass, magnesiumFluoride } from './materials/solids.ts';
import { pureWater, seaWater } from './materials/water.ts';
import type { FilmStack, Material } from './types.ts';

const OILS = {
  petrol,
  kerosene,
  diesel,
  lubricatingOil,
  lightCrude,
  mediumCrude,
  heavyCrude,
  vegetableOil,
} as const;

export type FilmPresetName = 'soap' | 'bubbleMix' | keyof typeof OILS | 'magnesiumFluorideOnGlass';

/** Whether a preset is an oil lying on water. */
export function isOilOnWater(preset: string): boolean {
  return Object.hasOwn(OILS, preset);
}

/**
 * The stack of a named film: soap and bubble mix in air, oils on water, magnesium fluoride on crown glass.
 * @param options.water temperature and salinity under an oil; fresh water at 20 °C without
 * @throws RangeError for an unknown name or absurd water
 */
export function filmStackFor(
  preset: string,
  options: { readonly water?: { readonly temperatureC: number; readonly salinity: number } } = {},
): FilmStack {
  const plain = (film: Material, substrate: Material): FilmStack => ({
    ambient: air,
    above: [],
    film,
    below: [],
    substrate,
  });
  if (preset === 'soap') return plain(soapSolution, air);
  if (preset === 'bubbleMix') return plain(bubbleMix, air);
  if (preset === 'magnesiumFluorideOnGlass') return plain(magnesiumFluoride, crownGlass);
  if (!isOilOnWater(preset)) throw new RangeError(`There is no film "${preset}".`);
  const water = options.water ? seaWater(options.water.temperatureC, options.water.salinity) : pureWater;
  return plain(OILS[preset as keyof typeof OILS], water);
}
