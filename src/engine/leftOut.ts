import { pixelsOf } from '../photo/rectangle.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { LEFT_OUT } from './leftOutMarks.ts';
import { photoViewOf } from './photoView.ts';
import type { Setup } from './setup.ts';
import { fillCapsule, fillPolygon } from './spans.ts';
import { leaveOutSlanted } from './viewSeen.ts';

export { LEFT_OUT };

/**
 * What a person says takes part: the region's polygon, else the whole photo, then each stroke of the brush over it in
 * its turn. Without a polygon, a first stroke that paints in begins with nothing: the region is then what is painted.
 * @returns one byte a pixel, row by row, of `LEFT_OUT` (no or outsideRegion)
 */
export function paintedOutside(
  width: number,
  height: number,
  { region, strokes = [] }: Pick<Setup, 'region' | 'strokes'>,
): Uint8Array {
  const out = new Uint8Array(width * height);
  const polygon = region && region.length >= 3 ? region : null;
  if (polygon || strokes[0]?.paint === 'in') out.fill(LEFT_OUT.outsideRegion);
  if (polygon) fillPolygon(out, width, height, polygon, LEFT_OUT.no);
  for (const { paint, points, widthPx } of strokes) {
    const value = paint === 'in' ? LEFT_OUT.no : LEFT_OUT.outsideRegion;
    for (let k = 0; k < points.length; k++)
      fillCapsule(out, width, height, points[Math.max(0, k - 1)]!, points[k]!, widthPx / 2, value);
  }
  return out;
}

/**
 * Pixels that take no part: outside the region or painted out, seen too flat or above the horizon, a card, or clipped. Painting in brings no colour back:
 * clipped pixels and the card stay out.
 * @returns one byte a pixel of `LEFT_OUT`
 */
export function leftOutOf(pixels: PhotoPixels, setup: Setup): Uint8Array {
  const { width, height, codes, channels, maxCode } = pixels;
  const out = paintedOutside(width, height, setup);
  const view = photoViewOf(setup, width, height)?.view;
  if (view) leaveOutSlanted(out, view);
  const clipped = (maxCode * 254) / 255;
  for (let i = 0, at = 0; i < out.length; i++, at += channels) {
    if (out[i]) continue;
    if (codes[at]! >= clipped || codes[at + 1]! >= clipped || codes[at + 2]! >= clipped)
      out[i] = LEFT_OUT.noColour;
  }
  const white = setup.references?.white;
  if (white) {
    const [left, top, right, bottom] = pixelsOf(white, pixels);
    for (let y = top; y < bottom; y++) {
      for (let i = y * width + left; i < y * width + right; i++) {
        if (out[i] === LEFT_OUT.no) out[i] = LEFT_OUT.noColour;
      }
    }
  }
  return out;
}
