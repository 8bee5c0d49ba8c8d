import type { Matrix3, Triple } from '../colour/matrix3.ts';
import { D65_XY, DISPLAY_P3, matrixFromPrimaries, SRGB, xyzOfChromaticity } from '../colour/rgb.ts';
import type { RgbEncoding } from '../colour/types.ts';

type Chromaticity = readonly [number, number];

/** What a photo without a word about its colours is taken as. */
export const untagged = SRGB;

/** Those that profiles are recognised as. */
export const KNOWN_ENCODINGS: readonly RgbEncoding[] = [SRGB, DISPLAY_P3];

/** The white of the ICC profile connection space as its header states it (ICC.1:2022, 7.2.16). */
export const PCS_WHITE: Triple = [0.9642, 1, 0.8249];

/** Adobe RGB (1998), 4.3.1 and 4.3.4: cameras say so by the DCF option file mark `R03`, without a profile. */
export const ADOBE_RGB: RgbEncoding = {
  id: 'adobe-rgb-1998',
  toXyz: matrixFromPrimaries(
    [
      [0.64, 0.33],
      [0.21, 0.71],
      [0.15, 0.06],
    ],
    D65_XY,
  ),
  whiteXyz: xyzOfChromaticity(D65_XY),
  encode: (linear) => linear ** (256 / 563),
  decode: (code) => code ** (563 / 256),
};

/**
 * By a plain power of the code, with primaries and white as chromaticities (PNG `gAMA` and `cHRM`); undefined where the
 * numbers, which come from a file, describe no colour space.
 */
export function powerEncoding(
  exponent: number,
  primaries: readonly Chromaticity[],
  white: Chromaticity,
): RgbEncoding | undefined {
  const toXyz = orUndefined(() => matrixFromPrimaries(primaries, white));
  if (!toXyz || !(exponent > 0.2 && exponent < 5)) return undefined;
  return {
    id: `power ${exponent.toFixed(3)}`,
    toXyz,
    whiteXyz: xyzOfChromaticity(white),
    encode: (linear) => linear ** (1 / exponent),
    decode: (code) => code ** exponent,
  };
}

/** A matrix worked out from a file's numbers, or undefined where it is singular, nearly so, or not a number. */
export function orUndefined(make: () => Matrix3): Matrix3 | undefined {
  try {
    const matrix = make();
    return matrix.every((value) => Math.abs(value) < 1e6) ? matrix : undefined;
  } catch {
    return undefined;
  }
}
