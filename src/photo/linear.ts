import { pixelsOf, type Rectangle } from './rectangle.ts';
import { linearTable } from './toneTable.ts';
import type { PhotoPixels } from './types.ts';

/**
 * Linear light in the photo's own primaries (no change of primaries or white), 0..1 of its largest code.
 * @param rectangle part of the photo; all of it where absent; clipped to the photo
 * @param out optional, 3 values a pixel
 * @returns interleaved R, G, B row by row, `right - left` pixels a row
 * @throws PhotoError where the rectangle misses the photo
 */
export function linearLight(pixels: PhotoPixels, rectangle?: Rectangle, out?: Float32Array): Float32Array {
  const { codes, channels, width } = pixels;
  const table = linearTable(pixels.encoding, pixels.maxCode);
  const [left, top, right, bottom] = rectangle
    ? pixelsOf(rectangle, pixels)
    : [0, 0, pixels.width, pixels.height];
  const light = out ?? new Float32Array((right - left) * (bottom - top) * 3);
  let to = 0;
  for (let y = top; y < bottom; y++) {
    const end = (y * width + right) * channels;
    for (let at = (y * width + left) * channels; at < end; at += channels) {
      light[to] = table[codes[at]!]!;
      light[to + 1] = table[codes[at + 1]!]!;
      light[to + 2] = table[codes[at + 2]!]!;
      to += 3;
    }
  }
  return light;
}

// The other two ways of looking at code values, so that a reader of pixels needs this one place.
export { EXPOSURE, exposureMask } from './exposure.ts';
export { type RegionMean, regionMean } from './regionMean.ts';
