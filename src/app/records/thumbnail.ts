/** Longer side of a thumbnail, pixels: sharp at 64 points on a dense screen. */
const LONG_SIDE = 240;

/** A small JPEG of the photo, drawn anew and so without its metadata; null where the browser gives none. */
export function thumbnailOf(bitmap: ImageBitmap): Promise<Blob | null> {
  const share = Math.min(1, LONG_SIDE / Math.max(bitmap.width, bitmap.height));
  const canvas = document.createElement('canvas');
  canvas.width = Math.max(1, Math.round(bitmap.width * share));
  canvas.height = Math.max(1, Math.round(bitmap.height * share));
  const context = canvas.getContext('2d');
  if (!context) return Promise.resolve(null);
  context.imageSmoothingQuality = 'high';
  context.drawImage(bitmap, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve) => canvas.toBlob(resolve, 'image/jpeg', 0.8));
}
