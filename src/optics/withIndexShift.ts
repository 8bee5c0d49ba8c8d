import type { Material } from './types.ts';

/** The same material with its real index moved by a constant, as an uncertain index does. */
export function withIndexShift(material: Material, shift: number): Material {
  return { ...material, refractiveIndex: (wavelengthNm) => material.refractiveIndex(wavelengthNm) + shift };
}
