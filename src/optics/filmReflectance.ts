import { add, complex, divide, multiply, ONE, phase, squaredModulus, subtract } from './complex.ts';
import { checkIncidence } from './fresnel.ts';
import { foldSides } from './sides.ts';
import type { FilmStack, Polarisation } from './types.ts';

/**
 * Reflectance (0..1) of a film stack at one thickness, wavelength and angle: the exact sum over all internal
 * reflections (Airy 1833; Born & Wolf, 7.6.1), complex indices throughout.
 * @throws RangeError for an angle outside 0..89.9 degrees or a negative thickness
 */
export function filmReflectance(
  stack: FilmStack,
  thicknessNm: number,
  wavelengthNm: number,
  incidenceRad: number,
  polarisation: Polarisation,
): number {
  checkIncidence(incidenceRad);
  if (!(thicknessNm >= 0)) throw new RangeError(`A film cannot be ${thicknessNm} nm thick; give 0 or more.`);
  if (polarisation === 'unpolarised') {
    return (
      (filmReflectance(stack, thicknessNm, wavelengthNm, incidenceRad, 's') +
        filmReflectance(stack, thicknessNm, wavelengthNm, incidenceRad, 'p')) /
      2
    );
  }
  const sides = foldSides(stack, wavelengthNm, incidenceRad, polarisation);
  const z = multiply(sides.bottom, phase(multiply(sides.doublePassPerNm, complex(thicknessNm))));
  const bounced = divide(multiply(sides.through, z), subtract(ONE, multiply(sides.under, z)));
  return squaredModulus(add(sides.top, bounced));
}
