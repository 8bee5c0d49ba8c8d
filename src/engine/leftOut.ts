import { pixelsOf } from '../photo/rectangle.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { Point, Setup } from './setup.ts';

/** Marks of pixels that are not read. */
export const LEFT_OUT = { no: 0, outsideRegion: 1, noColour: 2 } as const;

/** Whether (x, y) lies in a polygon, by crossings of a ray (even-odd). */
function inside(polygon: readonly Point[], x: number, y: number): boolean {
  let odd = false;
  for (let i = 0, j = polygon.length - 1; i < polygon.length; j = i++) {
    const [xi, yi] = polygon[i]!;
    const [xj, yj] = polygon[j]!;
    if (yi > y !== yj > y && x < ((xj - xi) * (y - yi)) / (yj - yi) + xi) odd = !odd;
  }
  return odd;
}

/**
 * Pixels that take no part: outside the region, a card, clipped, or too dark to hold colour in a film that is not dark.
 * @returns one byte a pixel of `LEFT_OUT`
 */
export function leftOutOf(pixels: PhotoPixels, setup: Setup): Uint8Array {
  const { width, height, codes, channels, maxCode } = pixels;
  const out = new Uint8Array(width * height);
  const clipped = (maxCode * 254) / 255;
  for (let i = 0, at = 0; i < out.length; i++, at += channels) {
    if (codes[at]! >= clipped || codes[at + 1]! >= clipped || codes[at + 2]! >= clipped)
      out[i] = LEFT_OUT.noColour;
  }
  const white = setup.references?.white;
  if (white) {
    const [left, top, right, bottom] = pixelsOf(white, pixels);
    for (let y = top; y < bottom; y++) out.fill(LEFT_OUT.noColour, y * width + left, y * width + right);
  }
  const region = setup.region;
  if (region && region.length >= 3) {
    const xs = region.map((p) => p[0]);
    const ys = region.map((p) => p[1]);
    const left = Math.min(...xs);
    const right = Math.max(...xs);
    const top = Math.min(...ys);
    const bottom = Math.max(...ys);
    for (let y = 0; y < height; y++) {
      for (let x = 0; x < width; x++) {
        const near = x + 0.5 >= left && x + 0.5 <= right && y + 0.5 >= top && y + 0.5 <= bottom;
        if (!near || !inside(region, x + 0.5, y + 0.5)) out[y * width + x] = LEFT_OUT.outsideRegion;
      }
    }
  }
  return out;
}
