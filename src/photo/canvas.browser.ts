import { PhotoError } from './types.ts';

/** No more than this many pixels are on a canvas at once: far below every browser's limit, and soon read. */
const STRIP_PIXELS = 1 << 19;

const MEMORY_SENTENCE =
  'There is not enough memory to open this photo. Close other tabs and apps, then open it again.';

/** A bitmap's code values, a few rows at a time from the top; RGBA. */
export async function* readStrips(
  bitmap: ImageBitmap,
  colorSpace: PredefinedColorSpace = 'srgb',
): AsyncGenerator<{ readonly codes: Uint8ClampedArray; readonly firstRow: number; readonly rows: number }> {
  const { width, height } = bitmap;
  const rowsAtOnce = Math.min(height, Math.max(1, Math.floor(STRIP_PIXELS / width)));
  const context = readableContext(width, rowsAtOnce, colorSpace);
  let lastPause = performance.now();
  for (let firstRow = 0; firstRow < height; firstRow += rowsAtOnce) {
    const rows = Math.min(rowsAtOnce, height - firstRow);
    context.clearRect(0, 0, width, rows);
    context.drawImage(bitmap, 0, firstRow, width, rows, 0, 0, width, rows);
    let codes: Uint8ClampedArray;
    try {
      codes = context.getImageData(0, 0, width, rows).data;
    } catch (cause) {
      throw new PhotoError(MEMORY_SENTENCE, { cause });
    }
    yield { codes, firstRow, rows };
    // A page must answer a tap, and a worker a cancel, between two strips.
    if (performance.now() - lastPause > 30) {
      await new Promise((resolve) => setTimeout(resolve));
      lastPause = performance.now();
    }
  }
}

/** A canvas in main memory, whose pixels come back as they went in. */
export function readableContext(
  width: number,
  height: number,
  colorSpace: PredefinedColorSpace = 'srgb',
): OffscreenCanvasRenderingContext2D {
  if (typeof OffscreenCanvas === 'undefined')
    throw new PhotoError(
      'This browser is too old to read the pixels of a photo. Update it, then open the photo again.',
    );
  const context = new OffscreenCanvas(width, height).getContext('2d', {
    willReadFrequently: true,
    colorSpace,
  });
  if (!context) throw new PhotoError(MEMORY_SENTENCE);
  context.imageSmoothingEnabled = false;
  return context;
}
