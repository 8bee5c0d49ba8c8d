/**
 * Single-band TIFF files that any reader of TIFF 6.0 opens: classic, little endian, uncompressed strips.
 * GeoTIFF tags follow OGC 19-008r4.
 */

/** Where a grid lies on the ground. */
export interface GeoPlacement {
  /** EPSG code of a projected system with metres, or null for a local grid in metres. */
  readonly epsg: number | null;
  /** Coordinates of the outer corner of the top left pixel, metres east and north. */
  readonly westM: number;
  readonly northM: number;
  /** Side of a pixel, metres. */
  readonly pixelM: number;
}

export interface FloatRaster {
  readonly width: number;
  readonly height: number;
  readonly values: Float32Array;
  readonly geo?: GeoPlacement;
}

export interface ByteRaster {
  readonly width: number;
  readonly height: number;
  readonly values: Uint8Array;
}

const SHORT = 3;
const LONG = 4;
const ASCII = 2;
const DOUBLE = 12;
const BYTES_OF: Readonly<Record<number, number>> = { [SHORT]: 2, [LONG]: 4, [ASCII]: 1, [DOUBLE]: 8 };
/** Strips of about this many bytes: small enough to stream, large enough to be few. */
const STRIP_BYTES = 1 << 20;

interface Tag {
  readonly id: number;
  readonly type: number;
  readonly values: readonly number[];
}

/** 32-bit float, one band; NaN is kept as NaN and named as the value without data. */
export function encodeFloatTiff(raster: FloatRaster): Uint8Array {
  const bytes = new Uint8Array(raster.values.buffer, raster.values.byteOffset, raster.values.byteLength);
  const extra: Tag[] = [
    { id: 339, type: SHORT, values: [3] },
    { id: 42113, type: ASCII, values: asciiOf('nan') },
  ];
  if (raster.geo) extra.push(...geoTags(raster.geo));
  return assemble(raster.width, raster.height, 32, bytes, extra);
}

/** 8-bit unsigned, one band. */
export function encodeByteTiff(raster: ByteRaster): Uint8Array {
  return assemble(raster.width, raster.height, 8, raster.values, [{ id: 339, type: SHORT, values: [1] }]);
}

function asciiOf(text: string): number[] {
  return [...text].map((c) => c.charCodeAt(0)).concat(0);
}

function geoTags(geo: GeoPlacement): Tag[] {
  const keys =
    geo.epsg === null
      ? [1, 1, 0, 3, 1024, 0, 1, 32767, 1025, 0, 1, 1, 3076, 0, 1, 9001]
      : [1, 1, 0, 4, 1024, 0, 1, 1, 1025, 0, 1, 1, 3072, 0, 1, geo.epsg, 3076, 0, 1, 9001];
  return [
    { id: 33550, type: DOUBLE, values: [geo.pixelM, geo.pixelM, 0] },
    { id: 33922, type: DOUBLE, values: [0, 0, 0, geo.westM, geo.northM, 0] },
    { id: 34735, type: SHORT, values: keys },
  ];
}

function assemble(
  width: number,
  height: number,
  bits: number,
  pixels: Uint8Array,
  extra: readonly Tag[],
): Uint8Array {
  const rowBytes = (width * bits) / 8;
  if (!(width > 0 && height > 0) || pixels.length !== rowBytes * height) {
    throw new RangeError(`A raster of ${width} x ${height} does not fit ${pixels.length} bytes.`);
  }
  const rowsPerStrip = Math.max(1, Math.floor(STRIP_BYTES / rowBytes));
  const strips = Math.ceil(height / rowsPerStrip);
  const counts = Array.from(
    { length: strips },
    (_, i) => Math.min(rowsPerStrip, height - i * rowsPerStrip) * rowBytes,
  );
  const offsets = counts.map((_, i) => 8 + i * rowsPerStrip * rowBytes);
  const tags: Tag[] = [
    { id: 256, type: LONG, values: [width] },
    { id: 257, type: LONG, values: [height] },
    { id: 258, type: SHORT, values: [bits] },
    { id: 259, type: SHORT, values: [1] },
    { id: 262, type: SHORT, values: [1] },
    { id: 273, type: LONG, values: offsets },
    { id: 277, type: SHORT, values: [1] },
    { id: 278, type: LONG, values: [rowsPerStrip] },
    { id: 279, type: LONG, values: counts },
    ...extra,
  ];
  tags.sort((a, b) => a.id - b.id);
  const pixelsEnd = 8 + pixels.length;
  const directoryAt = pixelsEnd + (pixelsEnd % 2);
  const valuesAt = directoryAt + 2 + 12 * tags.length + 4;
  const sizeOf = (tag: Tag) => tag.values.length * BYTES_OF[tag.type]!;
  let size = valuesAt;
  for (const tag of tags) if (sizeOf(tag) > 4) size += sizeOf(tag) + (sizeOf(tag) % 2);
  const file = new Uint8Array(size);
  file.set(pixels, 8);
  const view = new DataView(file.buffer);
  view.setUint16(0, 0x4949, true);
  view.setUint16(2, 42, true);
  view.setUint32(4, directoryAt, true);
  view.setUint16(directoryAt, tags.length, true);
  let next = valuesAt;
  tags.forEach((tag, i) => {
    const at = directoryAt + 2 + 12 * i;
    view.setUint16(at, tag.id, true);
    view.setUint16(at + 2, tag.type, true);
    view.setUint32(at + 4, tag.values.length, true);
    let place = at + 8;
    if (sizeOf(tag) > 4) {
      view.setUint32(at + 8, next, true);
      place = next;
      next += sizeOf(tag) + (sizeOf(tag) % 2);
    }
    for (const value of tag.values) {
      if (tag.type === SHORT) view.setUint16(place, value, true);
      else if (tag.type === LONG) view.setUint32(place, value, true);
      else if (tag.type === DOUBLE) view.setFloat64(place, value, true);
      else view.setUint8(place, value);
      place += BYTES_OF[tag.type]!;
    }
  });
  return file;
}
