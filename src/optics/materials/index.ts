import type { Material } from '../types.ts';
import { air } from './air.ts';
import { bubbleMix, glycerolWater, soapSolution } from './aqueous.ts';
import {
  diesel,
  heavyCrude,
  kerosene,
  lightCrude,
  lubricatingOil,
  mediumCrude,
  petrol,
  vegetableOil,
} from './oils.ts';
import { crownGlass, magnesiumFluoride, windowGlass } from './solids.ts';
import { pureWater, seaWater } from './water.ts';

/** Materials by the name a set-up uses. */
const NAMED: Readonly<Record<string, Material>> = {
  air,
  pureWater,
  seaWater: seaWater(15, 35),
  soapSolution,
  bubbleMix,
  glycerol: glycerolWater(100),
  petrol,
  kerosene,
  diesel,
  lubricatingOil,
  lightCrude,
  mediumCrude,
  heavyCrude,
  vegetableOil,
  magnesiumFluoride,
  crownGlass,
  windowGlass,
};

export const MATERIAL_IDS: readonly string[] = Object.keys(NAMED);

/** @throws RangeError naming the known materials when there is no such one */
export function materialById(id: string): Material {
  const material = Object.hasOwn(NAMED, id) ? NAMED[id] : undefined;
  if (!material) throw new RangeError(`There is no material "${id}"; known are ${MATERIAL_IDS.join(', ')}.`);
  return material;
}
