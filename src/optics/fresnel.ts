import { add, type Complex, complex, divide, multiply, ONE, squareRoot, subtract } from './complex.ts';
import type { Material } from './types.ts';

/** Largest incidence angle that is treated: 89.9 degrees. Beyond it a level surface is seen as a line. */
export const MAX_INCIDENCE_RAD = (89.9 * Math.PI) / 180;

/** Complex index n + ik of a material. */
export function complexIndex(material: Material, wavelengthNm: number): Complex {
  return complex(material.refractiveIndex(wavelengthNm), material.extinction(wavelengthNm));
}

/**
 * Cosine of the angle inside a medium of complex index, by Snell's law. The branch is that of the wave that
 * decays into the medium: Im(n cos) >= 0.
 * @param tangential n0 sin(incidence), the same in every layer
 */
export function cosineInside(index: Complex, tangential: number): Complex {
  const sine = divide(complex(tangential), index);
  const cosine = squareRoot(subtract(ONE, multiply(sine, sine)));
  const normal = multiply(index, cosine);
  return normal.im < 0 || (normal.im === 0 && normal.re < 0) ? { re: -cosine.re, im: -cosine.im } : cosine;
}

/** Tilted admittance of a medium, in units of that of vacuum: n cos for s, n / cos for p (Born & Wolf, 1.6). */
export function admittance(index: Complex, cosine: Complex, polarisation: 's' | 'p'): Complex {
  return polarisation === 's' ? multiply(index, cosine) : divide(index, cosine);
}

/**
 * Signed amplitude reflection coefficient of the tangential electric field, (eta0 - eta1) / (eta0 + eta1).
 * s and p agree at normal incidence; a phase flip is nothing but a negative sign here. Born & Wolf, 1.5.2.
 */
export function reflectionCoefficient(eta0: Complex, eta1: Complex): Complex {
  return divide(subtract(eta0, eta1), add(eta0, eta1));
}

/** @throws RangeError when the angle is not in 0 .. 89.9 degrees */
export function checkIncidence(incidenceRad: number): void {
  if (!(incidenceRad >= 0 && incidenceRad <= MAX_INCIDENCE_RAD + 1e-12)) {
    throw new RangeError(
      `The angle of incidence must lie between 0 and 89.9 degrees from the vertical; ${((incidenceRad * 180) / Math.PI).toFixed(1)} degrees does not.`,
    );
  }
}
