import { type TextureMap, textureMap } from '../match/texture.ts';
import { pixelsOf } from '../photo/rectangle.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { LEFT_OUT } from './leftOutMarks.ts';
import { photoViewOf } from './photoView.ts';
import type { Setup, Stroke } from './setup.ts';
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

/** Leaves out what is rough without a film's colours, but for what a finger has painted in. */
function leaveOutTexture(
  out: Uint8Array,
  width: number,
  height: number,
  strokes: readonly Stroke[],
  { side, columns, rough }: TextureMap,
): void {
  // Of the strokes alone: the first to paint in begins with nothing, so only what is painted in is left.
  const first = strokes.findIndex(({ paint }) => paint === 'in');
  const asked = first < 0 ? null : paintedOutside(width, height, { strokes: strokes.slice(first) });
  for (let block = 0; block < rough.length; block++) {
    if (!rough[block]) continue;
    const left = (block % columns) * side;
    const top = Math.floor(block / columns) * side;
    for (let y = top; y < top + side; y++) {
      for (let i = y * width + left; i < y * width + left + side; i++) {
        if (out[i] === LEFT_OUT.no && asked?.[i] !== LEFT_OUT.no) out[i] = LEFT_OUT.texture;
      }
    }
  }
}

/**
 * Pixels that take no part: outside the region or painted out, seen too flat or above the horizon, a card, clipped, or
 * rough like no film. A finger can paint rough places in; clipped pixels and the card stay out, since painting brings
 * no colour back.
 * @param texture of the photo, judged once by `textureMap`
 * @returns one byte a pixel of `LEFT_OUT`
 */
export function leftOutOf(pixels: PhotoPixels, setup: Setup, texture = textureMap(pixels)): Uint8Array {
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
  leaveOutTexture(out, width, height, setup.strokes ?? [], texture);
  return out;
}
