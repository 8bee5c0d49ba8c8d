import { add, type Complex, complex, divide, multiply, subtract } from './complex.ts';
import { admittance, checkIncidence, complexIndex, cosineInside } from './fresnel.ts';
import type { FixedLayer, Material, Polarisation } from './types.ts';

/** Cosine and sine of a complex angle. */
function cosineAndSine(a: Complex): { cos: Complex; sin: Complex } {
  const ch = Math.cosh(a.im);
  const sh = Math.sinh(a.im);
  return {
    cos: { re: Math.cos(a.re) * ch, im: -Math.sin(a.re) * sh },
    sin: { re: Math.sin(a.re) * ch, im: Math.cos(a.re) * sh },
  };
}

/**
 * Reflectance of any number of layers by the characteristic matrix (Abeles 1950; Born & Wolf, 1.6.2), in the
 * convention n + ik, exp(-i omega t).
 *
 * Independent of the Airy sum in `filmReflectance`; the two agree to rounding.
 * @throws RangeError for an angle outside 0..89.9 degrees
 */
export function stackReflectance(
  ambient: Material,
  layers: readonly FixedLayer[],
  substrate: Material,
  wavelengthNm: number,
  incidenceRad: number,
  polarisation: Polarisation,
): number {
  checkIncidence(incidenceRad);
  if (polarisation === 'unpolarised') {
    const s = stackReflectance(ambient, layers, substrate, wavelengthNm, incidenceRad, 's');
    return (s + stackReflectance(ambient, layers, substrate, wavelengthNm, incidenceRad, 'p')) / 2;
  }
  const tangential = ambient.refractiveIndex(wavelengthNm) * Math.sin(incidenceRad);
  const admittanceOf = (material: Material) => {
    const index = complexIndex(material, wavelengthNm);
    return admittance(index, cosineInside(index, tangential), polarisation);
  };
  // The field pair (B, C) starts at the substrate and is carried up through each layer.
  let b: Complex = { re: 1, im: 0 };
  let c: Complex = admittanceOf(substrate);
  for (const layer of [...layers].reverse()) {
    const index = complexIndex(layer.material, wavelengthNm);
    const cosine = cosineInside(index, tangential);
    const eta = admittance(index, cosine, polarisation);
    const delta = multiply(
      multiply(index, cosine),
      complex((2 * Math.PI * layer.thicknessNm) / wavelengthNm),
    );
    const { cos, sin } = cosineAndSine(delta);
    const turned: Complex = { re: sin.im, im: -sin.re }; // -i sin
    const nextB = add(multiply(cos, b), divide(multiply(turned, c), eta));
    c = add(multiply(multiply(turned, eta), b), multiply(cos, c));
    b = nextB;
  }
  const eta0 = admittanceOf(ambient);
  const r = divide(subtract(multiply(eta0, b), c), add(multiply(eta0, b), c));
  return r.re * r.re + r.im * r.im;
}
