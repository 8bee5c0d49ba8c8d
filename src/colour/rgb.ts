import { apply3, invert3, type Matrix3, type Triple } from './matrix3.ts';
import type { RgbEncoding } from './types.ts';

/** Chromaticity of D65 as sRGB and Display P3 state it. */
export const D65_XY = [0.3127, 0.329] as const;

/** XYZ with Y = 1 of a chromaticity. */
export function xyzOfChromaticity([x, y]: readonly [number, number]): Triple {
  return [x / y, 1, (1 - x - y) / y];
}

/**
 * Linear RGB to XYZ from the primaries and the white, in double precision, row-major 3 x 3; white has Y = 1.
 *
 * Of the three sets of sRGB matrices in use this is the derived one, as in CSS Color 4; the four-digit matrix that
 * IEC 61966-2-1 prints differs by up to 4e-5, its inverse by up to 4e-4.
 */
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

/** sRGB, IEC 61966-2-1:1999. */
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

/**
 * An encoding from its matrix (of a profile, say) and tone transfer. The matrix is scaled so that white has Y = 1.
 * @param toXyz row-major 3 x 3, linear RGB to XYZ of the encoding's own white
 * @throws RangeError when the matrix cannot be inverted or gives white no luminance
 */
export function rgbEncodingFromMatrix(
  id: string,
  toXyz: ArrayLike<number>,
  transfer: Pick<RgbEncoding, 'encode' | 'decode'>,
): RgbEncoding {
  const [x, y, z] = apply3(toXyz, [1, 1, 1]);
  if (!(y > 0))
    throw new RangeError(`The colour space "${id}" gives white no brightness; it cannot be used.`);
  const scaled = Float64Array.from(toXyz, (value) => value / y);
  invert3(scaled);
  return {
    id,
    toXyz: scaled,
    whiteXyz: [x / y, 1, z / y],
    encode: transfer.encode,
    decode: transfer.decode,
  };
}
