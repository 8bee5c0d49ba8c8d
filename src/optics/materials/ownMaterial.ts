import type { Material } from '../types.ts';
import { cauchyFromDispersion } from './make.ts';

/** A medium a person describes: n_D with Abbe number, or Cauchy A and B (B in square micrometres); k and spread optional. */
export type OwnMaterial =
  | { readonly nD: number; readonly abbe?: number; readonly k?: number; readonly spread?: number }
  | { readonly cauchyA: number; readonly cauchyB: number; readonly k?: number; readonly spread?: number };

/** Abbe number when none is given: light organic liquids and crown glasses lie between 45 and 65. */
const USUAL_ABBE = 55;

/**
 * Makes a material of one's own.
 * @throws RangeError with a sentence when a number is absurd
 */
export function ownMaterial(own: OwnMaterial): Material {
  const k = own.k ?? 0;
  const spread = own.spread ?? 0;
  if (!(k >= 0 && k <= 10)) throw new RangeError(`Extinction k must lie between 0 and 10; ${k} does not.`);
  if (!(spread >= 0 && spread <= 0.2))
    throw new RangeError(`The index spread must lie between 0 and 0.2; ${spread} does not.`);
  let refractiveIndex: (wavelengthNm: number) => number;
  if ('nD' in own) {
    const abbe = own.abbe ?? USUAL_ABBE;
    if (!(own.nD >= 1 && own.nD <= 5))
      throw new RangeError(`The index n_D must lie between 1 and 5; ${own.nD} does not.`);
    if (!(abbe >= 5 && abbe <= 200))
      throw new RangeError(`The Abbe number must lie between 5 and 200; ${abbe} does not.`);
    refractiveIndex = cauchyFromDispersion(own.nD, (own.nD - 1) / abbe);
  } else {
    const { cauchyA, cauchyB } = own;
    refractiveIndex = (l) => cauchyA + cauchyB / (l / 1000) ** 2;
    for (const l of [380, 780]) {
      const n = refractiveIndex(l);
      if (!(n >= 1 && n <= 5)) {
        throw new RangeError(
          `Cauchy A ${cauchyA} and B ${cauchyB} µm² give an index of ${n} at ${l} nm; it must lie between 1 and 5.`,
        );
      }
    }
  }
  return {
    id: 'own',
    name: 'own material',
    source: 'as stated by the user',
    rangeNm: [380, 780],
    indexSpread: spread,
    refractiveIndex,
    extinction: () => k,
  };
}
