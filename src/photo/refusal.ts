import type { SniffedPhoto } from './sniffed.ts';

/** Larger than any camera's photo: a file that claims it is damaged, or made to exhaust the memory. */
const MAX_PIXELS = 268_000_000;

export const HEIC_SENTENCE =
  'This phone saves photos as HEIC, which cannot be opened here. In the camera settings choose "most compatible" for the format, or share this photo as JPEG, then open it again.';

export const DAMAGED_SENTENCE =
  'This photo is damaged and cannot be opened. Copy it again from the camera, or open another.';

/** Why a file cannot be opened, in a sentence that says what to do; undefined where it can be tried. */
export function refusal(photo: SniffedPhoto, byteLength: number): string | undefined {
  if (byteLength === 0)
    return 'This file is empty. If it is still being copied or loaded from a cloud, wait for that, then open it again.';
  if (photo.format === 'tiff')
    return 'This is a raw photo (DNG) or a TIFF, which cannot be opened here. Export it as JPEG, or as 16-bit PNG to keep its fine steps, and open that.';
  if (photo.format === 'gif')
    return 'This is a GIF, which holds too few colours to measure. Open the photo that it was made from.';
  if (photo.format === 'unknown')
    return 'This file is not a photo that can be opened here. Choose a JPEG, PNG, WebP or AVIF.';
  if (!photo.complete)
    return 'This photo is cut short: its end is missing. If it is still being copied or sent, wait for that; else copy it again.';
  if (photo.width < 1 || photo.height < 1) return DAMAGED_SENTENCE;
  if (photo.width * photo.height > MAX_PIXELS)
    return `This photo claims ${photo.width} x ${photo.height} pixels, more than can be measured. Crop it or make it smaller, and open that.`;
  return undefined;
}
