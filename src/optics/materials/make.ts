import type { Material } from '../types.ts';

const NONE = () => 0;

/** A transparent material from its index formula. */
export function transparent(
  id: string,
  name: string,
  source: string,
  rangeNm: readonly [number, number],
  refractiveIndex: (wavelengthNm: number) => number,
  indexSpread = 0,
): Material {
  return { id, name, source, rangeNm, indexSpread, refractiveIndex, extinction: NONE };
}

/** Wavelengths of the Fraunhofer lines that fix an index and its dispersion, micrometres. */
const F_UM = 0.4861;
const D_UM = 0.5893;
const C_UM = 0.6563;

/**
 * Two-term Cauchy index n = A + B / wavelength^2 through n_D with dispersion n_F - n_C.
 * @returns index against vacuum by wavelength in nm
 */
export function cauchyFromDispersion(nD: number, dispersion: number): (wavelengthNm: number) => number {
  const b = dispersion / (1 / F_UM ** 2 - 1 / C_UM ** 2);
  const a = nD - b / D_UM ** 2;
  return (wavelengthNm) => a + b / (wavelengthNm / 1000) ** 2;
}

/** Sellmeier index n^2 = 1 + sum B L^2 / (L^2 - C), L in micrometres, C in square micrometres. */
export function sellmeier(terms: readonly (readonly [number, number])[]): (wavelengthNm: number) => number {
  return (wavelengthNm) => {
    const square = (wavelengthNm / 1000) ** 2;
    let sum = 1;
    for (const [b, c] of terms) sum += (b * square) / (square - c);
    return Math.sqrt(sum);
  };
}

/** Smooth positive curve through three values: exponential of the parabola through their logarithms. */
export function exponentialThrough(
  points: readonly [readonly [number, number], readonly [number, number], readonly [number, number]],
): (wavelengthNm: number) => number {
  const [p, q, r] = points;
  const [x0, x1, x2] = [p[0], q[0], r[0]];
  const [y0, y1, y2] = [Math.log(p[1]), Math.log(q[1]), Math.log(r[1])];
  return (x) =>
    Math.exp(
      (y0 * (x - x1) * (x - x2)) / ((x0 - x1) * (x0 - x2)) +
        (y1 * (x - x0) * (x - x2)) / ((x1 - x0) * (x1 - x2)) +
        (y2 * (x - x0) * (x - x1)) / ((x2 - x0) * (x2 - x1)),
    );
}
