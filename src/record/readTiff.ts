/** Reads back the rasters that `floatTiff.ts` writes; it is no general TIFF reader. */
import { unzlibSync } from 'fflate';
import { DEFLATE, FLOAT_FORMAT, FLOAT_PREDICTOR, UNCOMPRESSED } from './floatTiff.ts';
import { MODEL_PIXEL_SCALE, MODEL_TIEPOINT } from './geoPlacement.ts';
import { DOUBLE, LONG, SHORT } from './tiffDirectory.ts';

export interface ReadRaster {
  readonly width: number;
  readonly height: number;
  /** Float32Array of a 32-bit float file, Uint8Array of an 8-bit file. */
  readonly values: Float32Array | Uint8Array;
  /** Its place in its own ground system, whichever that is; null for a picture. */
  readonly ground: { readonly westM: number; readonly northM: number; readonly pixelM: number } | null;
}

/** Why a raster cannot be read, in one sentence. */
export class RasterError extends Error {
  override readonly name = 'RasterError';
}

const DAMAGED = 'This map is damaged or was not written by Tintfathom: take it from another copy.';

/** @throws RasterError where the file is damaged or of another make */
export function readTiff(file: Uint8Array): ReadRaster {
  try {
    return read(file);
  } catch (cause) {
    if (cause instanceof RasterError) throw cause;
    throw new RasterError(DAMAGED, { cause });
  }
}

function read(file: Uint8Array): ReadRaster {
  const tags = readTags(file);
  const only = (id: number) => tags.get(id)?.[0];
  const width = only(256) ?? 0;
  const height = only(257) ?? 0;
  const bytesPerPixel = only(258) === 32 && only(339) === FLOAT_FORMAT ? 4 : only(258) === 8 ? 1 : 0;
  const compression = only(259);
  const offsets = tags.get(273) ?? [];
  const counts = tags.get(279) ?? [];
  const known = compression === UNCOMPRESSED || compression === DEFLATE;
  if (!known || bytesPerPixel === 0 || only(277) !== 1 || offsets.length !== counts.length) {
    throw new RasterError(DAMAGED);
  }
  const size = width * height * bytesPerPixel;
  // Deflate packs at most about 1000 to 1: a larger size is a damaged header, not a map.
  if (!(size > 0 && size <= 1100 * file.length)) throw new RasterError(DAMAGED);
  const pixels = new Uint8Array(size);
  let at = 0;
  offsets.forEach((offset, i) => {
    const stored = file.subarray(offset, offset + counts[i]!);
    const strip = compression === DEFLATE ? unzlibSync(stored) : stored;
    pixels.set(strip, at);
    at += strip.length;
  });
  if (at !== size) throw new RasterError(DAMAGED);
  const pixelM = only(MODEL_PIXEL_SCALE);
  const [, , , westM, northM] = tags.get(MODEL_TIEPOINT) ?? [];
  const ground =
    pixelM === undefined || westM === undefined || northM === undefined ? null : { westM, northM, pixelM };
  if (bytesPerPixel === 1) return { width, height, values: pixels, ground };
  if (only(317) === FLOAT_PREDICTOR) undoPredictor(pixels, width);
  return { width, height, values: new Float32Array(pixels.buffer), ground };
}

const READERS: Readonly<
  Record<number, { readonly bytes: number; readonly value: (view: DataView, at: number) => number }>
> = {
  [SHORT]: { bytes: 2, value: (view, at) => view.getUint16(at, true) },
  [LONG]: { bytes: 4, value: (view, at) => view.getUint32(at, true) },
  [DOUBLE]: { bytes: 8, value: (view, at) => view.getFloat64(at, true) },
};

function readTags(file: Uint8Array): Map<number, number[]> {
  const view = new DataView(file.buffer, file.byteOffset, file.byteLength);
  if (view.getUint16(0, true) !== 0x4949 || view.getUint16(2, true) !== 42) throw new RasterError(DAMAGED);
  const directoryAt = view.getUint32(4, true);
  const tags = new Map<number, number[]>();
  for (let i = 0; i < view.getUint16(directoryAt, true); i++) {
    const at = directoryAt + 2 + 12 * i;
    const type = view.getUint16(at + 2, true);
    const read = READERS[type];
    if (!read) continue;
    const count = view.getUint32(at + 4, true);
    if (count * read.bytes > file.length) throw new RasterError(DAMAGED);
    const place = count * read.bytes > 4 ? view.getUint32(at + 8, true) : at + 8;
    tags.set(
      view.getUint16(at, true),
      Array.from({ length: count }, (_, k) => read.value(view, place + k * read.bytes)),
    );
  }
  return tags;
}

function undoPredictor(pixels: Uint8Array, width: number): void {
  const rowBytes = 4 * width;
  const row = new Uint8Array(rowBytes);
  for (let start = 0; start < pixels.length; start += rowBytes) {
    let sum = 0;
    for (let i = 0; i < rowBytes; i++) {
      sum += pixels[start + i]!;
      row[i] = sum;
    }
    for (let i = 0; i < width; i++) {
      for (let b = 0; b < 4; b++) pixels[start + 4 * i + 3 - b] = row[b * width + i]!;
    }
  }
}
