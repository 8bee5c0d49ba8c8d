import type { RgbEncoding } from '../colour/types.ts';
import { primariesToXyz, type Triple, whiteOf } from './adapt.ts';

const D65 = whiteOf(0.3127, 0.329);

const srgbDecode = (code: number) => (code <= 0.04045 ? code / 12.92 : ((code + 0.055) / 1.055) ** 2.4);
const srgbEncode = (linear: number) =>
  linear <= 0.0031308 ? linear * 12.92 : 1.055 * linear ** (1 / 2.4) - 0.055;

const SRGB: RgbEncoding = {
  id: 'srgb',
  toXyz: primariesToXyz([0.64, 0.33, 0.3, 0.6, 0.15, 0.06], D65)!,
  whiteXyz: D65,
  encode: srgbEncode,
  decode: srgbDecode,
};
const DISPLAY_P3: RgbEncoding = {
  ...SRGB,
  id: 'display-p3',
  toXyz: primariesToXyz([0.68, 0.32, 0.265, 0.69, 0.15, 0.06], D65)!,
};

/** What a photo without a word about its colours is taken as. */
export const untagged = SRGB;

export const KNOWN_ENCODINGS: readonly RgbEncoding[] = [SRGB, DISPLAY_P3];

/** Adobe RGB (1998), 4.3.1 and 4.3.4: cameras say so by the DCF option file mark `R03`, without a profile. */
export const ADOBE_RGB: RgbEncoding = {
  id: 'adobe-rgb-1998',
  toXyz: primariesToXyz([0.64, 0.33, 0.21, 0.71, 0.15, 0.06], D65)!,
  whiteXyz: D65,
  encode: (linear) => linear ** (256 / 563),
  decode: (code) => code ** (563 / 256),
};

/** By a plain power of the code, with primaries and white as chromaticities (PNG `gAMA` and `cHRM`). */
export function powerEncoding(
  exponent: number,
  primaries: readonly [number, number, number, number, number, number],
  white: Triple,
): RgbEncoding | undefined {
  const toXyz = primariesToXyz(primaries, white);
  if (!toXyz || !(exponent > 0.2 && exponent < 5)) return undefined;
  return {
    id: `power ${exponent.toFixed(3)}`,
    toXyz,
    whiteXyz: white,
    encode: (linear) => linear ** (1 / exponent),
    decode: (code) => code ** exponent,
  };
}

export { DISPLAY_P3, SRGB };
