/** Single-band TIFF files that any reader of TIFF 6.0 opens, with GeoTIFF tags where the ground is known. */
import { zlibSync } from 'fflate';
import { type GeoPlacement, geoTags } from './geoPlacement.ts';
import { ASCII, asciiOf, assembleTiff, LONG, SHORT, type TiffTag } from './tiffDirectory.ts';

/** `deflate` takes longer to write and is a few times smaller; `none` is the fastest. */
export type TiffCompression = 'none' | 'deflate';

export interface FloatRaster {
  readonly width: number;
  readonly height: number;
  /** Row by row from the top left. */
  readonly values: Float32Array;
  readonly geo?: GeoPlacement;
  readonly compression?: TiffCompression;
}

export interface ByteRaster {
  readonly width: number;
  readonly height: number;
  readonly values: Uint8Array;
  readonly geo?: GeoPlacement;
  readonly compression?: TiffCompression;
}

export const FLOAT_FORMAT = 3;
export const UNSIGNED_FORMAT = 1;
export const DEFLATE = 8;
export const UNCOMPRESSED = 1;
/** Adobe Photoshop TIFF Technical Note 3 (2005): bytes of a row sorted by significance, then differences. */
export const FLOAT_PREDICTOR = 3;
/** Strips of about this many bytes: small enough to stream, large enough to be few. */
const STRIP_BYTES = 1 << 20;
/** The fastest level: the predictor has done most of the work, and higher ones gain under a tenth. */
const LEVEL = 1;

/**
 * 32-bit float, one band; NaN is kept, and named as the value without data (GDAL_NODATA).
 * @throws RangeError where the values do not fit the size
 */
export function encodeFloatTiff(raster: FloatRaster): Uint8Array {
  const { values, compression = 'none' } = raster;
  const tags: TiffTag[] = [
    { id: 339, type: SHORT, values: [FLOAT_FORMAT] },
    { id: 42113, type: ASCII, values: asciiOf('nan') },
  ];
  if (compression === 'deflate') tags.push({ id: 317, type: SHORT, values: [FLOAT_PREDICTOR] });
  const bytes = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
  return encode(raster, 4, bytes, tags, (strip) => sortedBySignificance(strip, raster.width));
}

/**
 * 8-bit unsigned, one band.
 * @throws RangeError where the values do not fit the size
 */
export function encodeByteTiff(raster: ByteRaster): Uint8Array {
  const tags: TiffTag[] = [{ id: 339, type: SHORT, values: [UNSIGNED_FORMAT] }];
  return encode(raster, 1, raster.values, tags, (strip) => strip);
}

function encode(
  { width, height, geo, compression = 'none' }: FloatRaster | ByteRaster,
  bytesPerPixel: number,
  pixels: Uint8Array,
  own: readonly TiffTag[],
  prepare: (strip: Uint8Array) => Uint8Array,
): Uint8Array {
  const rowBytes = width * bytesPerPixel;
  if (!(width > 0 && height > 0) || pixels.length !== rowBytes * height) {
    throw new RangeError(
      `A raster of ${width} × ${height} does not fit ${pixels.length / bytesPerPixel} values.`,
    );
  }
  const rowsPerStrip = Math.max(1, Math.floor(STRIP_BYTES / rowBytes));
  const strips: Uint8Array[] = [];
  for (let row = 0; row < height; row += rowsPerStrip) {
    const strip = pixels.subarray(row * rowBytes, Math.min(height, row + rowsPerStrip) * rowBytes);
    strips.push(compression === 'deflate' ? zlibSync(prepare(strip), { level: LEVEL }) : strip);
  }
  return assembleTiff(strips, [
    { id: 256, type: LONG, values: [width] },
    { id: 257, type: LONG, values: [height] },
    { id: 258, type: SHORT, values: [8 * bytesPerPixel] },
    { id: 259, type: SHORT, values: [compression === 'deflate' ? DEFLATE : UNCOMPRESSED] },
    { id: 262, type: SHORT, values: [1] },
    { id: 277, type: SHORT, values: [1] },
    { id: 278, type: LONG, values: [rowsPerStrip] },
    ...own,
    ...(geo ? geoTags(geo) : []),
  ]);
}

/** Each row's most significant bytes first, then the next ones, and all of them as differences to the byte before. */
function sortedBySignificance(strip: Uint8Array, width: number): Uint8Array {
  const out = new Uint8Array(strip.length);
  const rowBytes = 4 * width;
  for (let row = 0; row < strip.length; row += rowBytes) {
    for (let i = 0; i < width; i++) {
      const from = row + 4 * i;
      for (let b = 0; b < 4; b++) out[row + b * width + i] = strip[from + 3 - b]!;
    }
    for (let i = row + rowBytes - 1; i > row; i--) out[i] = out[i]! - out[i - 1]!;
  }
  return out;
}
