import type { PhotoPixels } from './types.ts';

/** Bits of `exposureMask`. */
export const EXPOSURE = {
  /** A channel at or above 254/255 of the largest code: its light is unknown upward. */
  clipped: 1,
  /** Every channel below 8/255 of the largest code: half a code of rounding is then over 6 % of the light. */
  tooDark: 2,
} as const;

/** Lowest code that counts as clipped. */
export const clippedFrom = (maxCode: number): number => (maxCode / 255) * 254;
/** Lowest code that is bright enough. */
export const brightFrom = (maxCode: number): number => (maxCode / 255) * 8;

/**
 * Which pixels carry no usable light.
 * @param out optional, width * height bytes
 * @returns one byte a pixel, 0 or bits of `EXPOSURE`
 */
export function exposureMask(
  pixels: PhotoPixels,
  out: Uint8Array = new Uint8Array(pixels.width * pixels.height),
): Uint8Array {
  const { codes, channels, maxCode, width, height } = pixels;
  const clipped = clippedFrom(maxCode);
  const bright = brightFrom(maxCode);
  const count = width * height;
  for (let pixel = 0, at = 0; pixel < count; pixel++, at += channels) {
    const r = codes[at]!;
    const g = codes[at + 1]!;
    const b = codes[at + 2]!;
    out[pixel] =
      (r >= clipped || g >= clipped || b >= clipped ? EXPOSURE.clipped : 0) |
      (r < bright && g < bright && b < bright ? EXPOSURE.tooDark : 0);
  }
  return out;
}
