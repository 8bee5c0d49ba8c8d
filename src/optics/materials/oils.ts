import type { Material } from '../types.ts';
import { cauchyFromDispersion, exponentialThrough } from './make.ts';

const SOURCE = 'handbook-type values at 20 °C, from memory; two-term Cauchy through n_D and n_F - n_C';

function oil(
  id: string,
  name: string,
  nD: number,
  indexSpread: number,
  dispersion: number,
  extinction: readonly [number, number, number] | null = null,
): Material {
  return {
    id,
    name,
    source: extinction ? `${SOURCE}; absorption by order of magnitude only` : SOURCE,
    rangeNm: [400, 700],
    indexSpread,
    refractiveIndex: cauchyFromDispersion(nD, dispersion),
    extinction: extinction
      ? exponentialThrough([
          [450, extinction[0]],
          [550, extinction[1]],
          [650, extinction[2]],
        ])
      : () => 0,
  };
}

export const petrol = oil('petrol', 'petrol', 1.42, 0.015, 0.0085);
export const kerosene = oil('kerosene', 'kerosene, jet fuel', 1.445, 0.01, 0.009);
export const diesel = oil('diesel', 'diesel, gas oil', 1.465, 0.008, 0.01);
export const lubricatingOil = oil(
  'lubricatingOil',
  'lubricating, mineral or hydraulic oil',
  1.478,
  0.008,
  0.0095,
);
export const lightCrude = oil('lightCrude', 'light crude', 1.47, 0.01, 0.011, [1e-3, 3e-4, 1e-4]);
export const mediumCrude = oil('mediumCrude', 'medium crude', 1.49, 0.012, 0.013, [4e-3, 1.5e-3, 6e-4]);
export const heavyCrude = oil(
  'heavyCrude',
  'heavy crude, residual fuel',
  1.52,
  0.02,
  0.015,
  [1.5e-2, 7e-3, 3e-3],
);
export const vegetableOil = oil('vegetableOil', 'vegetable or fish oil', 1.472, 0.005, 0.0095);
