import type { Material } from '../types.ts';
import { cauchyFromDispersion, transparent } from './make.ts';
import { pureWater } from './water.ts';

const SOAP_INCREMENT = 0.002;

/** Soap or detergent solution of about 1 %: water with the same dispersion and a small increment (handbook-type, from memory). */
export const soapSolution: Material = transparent(
  'soapSolution',
  'soap solution, about 1 %',
  'Daimon & Masumura 2007 for water; increment 0.002 from memory',
  [380, 780],
  (l) => pureWater.refractiveIndex(l) + SOAP_INCREMENT,
  0.002,
);

/** n_D of glycerol in water at 20 °C by mass, every ten per cent (handbook table, from memory). */
const GLYCEROL_INDEX = [
  1.333, 1.3448, 1.3575, 1.3707, 1.3841, 1.3981, 1.4129, 1.4279, 1.4431, 1.4584, 1.4729,
];

/**
 * Glycerol-water mixture at 20 °C; linear between the table's tenths. Dispersion goes from water's 0.0060 to
 * glycerol's 0.0080 (Rheims et al. 1997 formula).
 * @throws RangeError outside 0..100 per cent
 */
export function glycerolWater(massPercent: number): Material {
  if (!(massPercent >= 0 && massPercent <= 100)) {
    throw new RangeError(`Glycerol must lie between 0 and 100 per cent by mass; ${massPercent} does not.`);
  }
  const tenth = Math.min(9, Math.floor(massPercent / 10));
  const part = massPercent / 10 - tenth;
  const nD = GLYCEROL_INDEX[tenth]! * (1 - part) + GLYCEROL_INDEX[tenth + 1]! * part;
  return transparent(
    'glycerolWater',
    `glycerol in water, ${massPercent} % by mass`,
    'handbook table of n_D at 20 °C (from memory)',
    [380, 780],
    cauchyFromDispersion(nD, 0.006 + 0.00002 * massPercent),
    0.002,
  );
}

/** Bubble mix: 10 to 30 % glycerol; the middle, with a spread that spans the recipes (from memory). */
export const bubbleMix: Material = {
  ...glycerolWater(20),
  id: 'bubbleMix',
  name: 'bubble mix with 10 to 30 % glycerol',
  indexSpread: 0.005,
};
