import { PhotoError } from './types.ts';

/** [x, y, width, height] in upright photo pixels. */
export type Rectangle = readonly [number, number, number, number];

/**
 * The whole pixels of a rectangle that lie on the photo, as [left, top, right, bottom] with right and bottom outside.
 * @throws PhotoError where none does
 */
export function pixelsOf(
  rectangle: Rectangle,
  size: { readonly width: number; readonly height: number },
): readonly [number, number, number, number] {
  const [x, y, width, height] = rectangle;
  const left = Math.max(0, Math.round(x));
  const top = Math.max(0, Math.round(y));
  const right = Math.min(size.width, Math.round(x + width));
  const bottom = Math.min(size.height, Math.round(y + height));
  if (!(right > left && bottom > top))
    throw new PhotoError(
      `The rectangle [${rectangle.join(', ')}] covers no pixel of this photo (${size.width} x ${size.height}): give x, y, width and height in pixels from the top left.`,
    );
  return [left, top, right, bottom];
}
