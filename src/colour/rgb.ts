import { apply3, invert3, type Matrix3, type Triple } from './matrix3.ts';
import type { RgbEncoding } from './types.ts';

/** Chromaticity of D65 as sRGB and Display P3 state it. */
export const D65_XY = [0.3127, 0.329] as const;

/** XYZ with Y = 1 of a chromaticity. */
export function xyzOfChromaticity([x, y]: readonly [number, number]): Triple {
  return [x / y, 1, (1 - x - y) / y];
}

/** Linear RGB to XYZ from the primaries and the white, in double precision (the set that CSS Color 4 uses). */
export function matrixFromPrimaries(
  primaries: readonly (readonly [number, number])[],
  white: readonly [number, number],
): Matrix3 {
  const columns = primaries.map(xyzOfChromaticity);
  const m = Float64Array.from({ length: 9 }, (_, k) => columns[k % 3]![Math.floor(k / 3)]!);
  const scale = apply3(invert3(m), xyzOfChromaticity(white));
  return m.map((v, k) => v * scale[k % 3]!);
}

/** sRGB transfer, linear to code. IEC 61966-2-1. */
export function encodeSrgb(linear: number): number {
  return linear <= 0.0031308 ? 12.92 * linear : 1.055 * linear ** (1 / 2.4) - 0.055;
}

/** sRGB transfer, code to linear. IEC 61966-2-1. */
export function decodeSrgb(code: number): number {
  return code <= 0.04045 ? code / 12.92 : ((code + 0.055) / 1.055) ** 2.4;
}

const white = xyzOfChromaticity(D65_XY);

export const SRGB: RgbEncoding = {
  id: 'srgb',
  toXyz: matrixFromPrimaries(
    [
      [0.64, 0.33],
      [0.3, 0.6],
      [0.15, 0.06],
    ],
    D65_XY,
  ),
  whiteXyz: white,
  encode: encodeSrgb,
  decode: decodeSrgb,
};

/** Primaries of SMPTE RP 431-2 with D65 and the sRGB transfer. */
export const DISPLAY_P3: RgbEncoding = {
  id: 'display-p3',
  toXyz: matrixFromPrimaries(
    [
      [0.68, 0.32],
      [0.265, 0.69],
      [0.15, 0.06],
    ],
    D65_XY,
  ),
  whiteXyz: white,
  encode: encodeSrgb,
  decode: decodeSrgb,
};
