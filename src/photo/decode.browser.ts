import { DISPLAY_P3, SRGB } from '../colour/rgb.ts';
import type { RgbEncoding } from '../colour/types.ts';
import { assemblePhoto } from './assemble.ts';
import { readStrips } from './canvas.browser.ts';
import { exifOrientation } from './exifOrientation.ts';
import { type InspectedPhoto, inspectPhoto } from './inspect.ts';
import { decodePngExactly } from './pngPixels.ts';
import { DAMAGED_SENTENCE, HEIC_SENTENCE } from './refusal.ts';
import { keepsCodes } from './selfTest.browser.ts';
import { fittingSize } from './shrink.ts';
import { type DecodedPhoto, PhotoError } from './types.ts';

/** 12.6 megapixels: what most phones take, under the 16.7 that some phones' canvases stop at. */
export const DEFAULT_MAX_PIXELS = 12_600_000;

/** Above this a 16-bit PNG would need half a gigabyte while it is unpacked. */
const MAX_DEEP_PIXELS = 16_000_000;

export interface DecodeOptions {
  /** Photos above this many pixels are shrunk to fit: `DEFAULT_MAX_PIXELS` where absent. */
  readonly maxPixels?: number;
  /** Share done in 0..1 with a few words. */
  readonly onProgress?: (share: number, step: string) => void;
  readonly signal?: AbortSignal;
}

/**
 * Opens a photo in a page or a worker: upright, with the file's own code values (no colour conversion), shrunk where it
 * has more than `maxPixels`. The shrinking averages light, not codes.
 * @throws PhotoError with one sentence that says what to do; the signal's reason where it was aborted
 */
export async function decodePhoto(
  file: Blob,
  fileName: string,
  options: DecodeOptions = {},
): Promise<DecodedPhoto> {
  const { maxPixels = DEFAULT_MAX_PIXELS, onProgress, signal } = options;
  signal?.throwIfAborted();
  onProgress?.(0, 'reading the file');
  const bytes = await readBytes(file);
  signal?.throwIfAborted();
  const sha256 = await hash(bytes);
  signal?.throwIfAborted();
  onProgress?.(0.1, 'reading the camera data');
  const photo = await inspectPhoto(bytes, fileName, sha256);
  signal?.throwIfAborted();
  onProgress?.(0.15, 'decoding');
  return decodesExactly(photo)
    ? decodePng(bytes, photo, maxPixels)
    : decodeByBrowser(file, bytes, photo, {
        maxPixels,
        ...(onProgress && { onProgress }),
        ...(signal && { signal }),
      });
}

async function readBytes(file: Blob): Promise<Uint8Array> {
  try {
    return new Uint8Array(await file.arrayBuffer());
  } catch (cause) {
    throw new PhotoError('This file cannot be read. It may have been moved or deleted: choose it again.', {
      cause,
    });
  }
}

async function hash(bytes: Uint8Array): Promise<string> {
  if (!globalThis.crypto?.subtle)
    throw new PhotoError(
      'Photos can be opened only where this app is reached over https (or on this very device).',
    );
  const digest = await crypto.subtle.digest('SHA-256', bytes as Uint8Array<ArrayBuffer>);
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('');
}

function decodesExactly({ sniffed }: InspectedPhoto): boolean {
  if (sniffed.format !== 'png' || sniffed.colourModel === 'indexed') return false;
  const fits = sniffed.width * sniffed.height <= MAX_DEEP_PIXELS;
  return fits && (sniffed.bitDepth === 16 || (sniffed.bitDepth === 8 && sniffed.hasAlpha));
}

async function decodePng(bytes: Uint8Array, photo: InspectedPhoto, maxPixels: number): Promise<DecodedPhoto> {
  const png = await decodePngExactly(bytes);
  const assembly = assemblePhoto(photo, png, maxPixels);
  assembly.push(png.codes, png.height);
  return assembly.finish();
}

async function decodeByBrowser(
  file: Blob,
  bytes: Uint8Array,
  photo: InspectedPhoto,
  options: DecodeOptions & { readonly maxPixels: number },
): Promise<DecodedPhoto> {
  const { onProgress, signal } = options;
  const { bitmap, notices } = await toBitmap(unturned(file, bytes, photo), photo, options.maxPixels);
  try {
    signal?.throwIfAborted();
    const { encoding, colorSpace, notice } = await howToRead(photo.encoding);
    const { width, height } = bitmap;
    // A browser that turned the picture all the same has swapped its sides: then nothing is left to do.
    const { sniffed } = photo;
    const turned = width !== height && width === sniffed.height && height === sniffed.width;
    const known: InspectedPhoto = {
      ...photo,
      orientation: turned ? 1 : photo.orientation,
      encoding,
      notices: [...photo.notices, ...notices, ...(notice ? [notice] : [])],
    };
    const assembly = assemblePhoto(known, { width, height, channels: 4, maxCode: 255 }, options.maxPixels);
    for await (const { codes, firstRow, rows } of readStrips(bitmap, colorSpace)) {
      signal?.throwIfAborted();
      assembly.push(codes, rows);
      onProgress?.(0.5 + (0.5 * (firstRow + rows)) / height, 'reading the pixels');
    }
    return assembly.finish();
  } finally {
    bitmap.close();
  }
}

/** The file with its orientation taken out, so that every browser hands over the pixels as stored, and we turn them. */
function unturned(file: Blob, bytes: Uint8Array, { sniffed, orientation }: InspectedPhoto): Blob {
  const found = exifOrientation(bytes, sniffed.exif);
  if (orientation === 1 || !found) return file;
  const type = { type: sniffed.mimeType };
  // A PNG chunk carries a checksum: it goes as a whole.
  if (sniffed.exifContainer) {
    const { offset, length } = sniffed.exifContainer;
    return new Blob([file.slice(0, offset), file.slice(offset + length)], type);
  }
  const upright = found.littleEndian ? Uint8Array.of(1, 0) : Uint8Array.of(0, 1);
  return new Blob([file.slice(0, found.at), upright, file.slice(found.at + 2)], type);
}

const BITMAP_OPTIONS: ImageBitmapOptions = { colorSpaceConversion: 'none', imageOrientation: 'from-image' };

async function toBitmap(
  file: Blob,
  photo: InspectedPhoto,
  maxPixels: number,
): Promise<{ bitmap: ImageBitmap; notices: readonly string[] }> {
  const { format, width, height } = photo.sniffed;
  try {
    return { bitmap: await createImageBitmap(file, BITMAP_OPTIONS), notices: [] };
  } catch (cause) {
    if (format === 'heic') throw new PhotoError(HEIC_SENTENCE, { cause });
    const size = fittingSize(width, height, maxPixels);
    const damaged =
      format === 'avif'
        ? 'This AVIF photo is damaged, or this browser is too old for it. Update the browser, or share the photo as JPEG.'
        : DAMAGED_SENTENCE;
    if (size.width === width) throw new PhotoError(damaged, { cause });
    // It may be memory that was short: the browser's own shrinking needs less.
    try {
      const bitmap = await createImageBitmap(file, {
        ...BITMAP_OPTIONS,
        resizeWidth: size.width,
        resizeHeight: size.height,
        resizeQuality: 'high',
      });
      return {
        bitmap,
        notices: [
          'The browser itself made this photo smaller, which darkens the finest light and dark edges a little.',
        ],
      };
    } catch {
      throw new PhotoError(damaged, { cause });
    }
  }
}

/**
 * A browser that converts colours on decoding whatever it is told gets a canvas wide enough to hold them; what comes back
 * is then in that canvas's encoding.
 */
async function howToRead(
  encoding: RgbEncoding,
): Promise<{ encoding: RgbEncoding; colorSpace: PredefinedColorSpace; notice?: string }> {
  if (encoding.id === SRGB.id || (await keepsCodes())) return { encoding, colorSpace: 'srgb' };
  return {
    encoding: DISPLAY_P3,
    colorSpace: 'display-p3',
    notice: `This browser converts the photo's colours ("${encoding.id}") to Display P3 on opening; colours beyond that are cut off.`,
  };
}
