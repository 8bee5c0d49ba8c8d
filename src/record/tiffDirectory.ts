/** The container of classic little-endian TIFF 6.0 (Adobe, 1992): strips first, then one directory. */

export const ASCII = 2;
export const SHORT = 3;
export const LONG = 4;
export const DOUBLE = 12;
export type TiffType = typeof ASCII | typeof SHORT | typeof LONG | typeof DOUBLE;
const BYTES_OF: Readonly<Record<TiffType, number>> = { [ASCII]: 1, [SHORT]: 2, [LONG]: 4, [DOUBLE]: 8 };

export interface TiffTag {
  readonly id: number;
  readonly type: TiffType;
  readonly values: readonly number[];
}

/** Text as the bytes of an ASCII tag, ended by a zero. */
export function asciiOf(text: string): number[] {
  return [...text].map((letter) => letter.charCodeAt(0)).concat(0);
}

const HEADER = 8;
const STRIP_OFFSETS = 273;
const STRIP_BYTE_COUNTS = 279;
/** Offsets are 32-bit numbers. */
const LARGEST = 2 ** 32;

/**
 * Bytes of a file with these strips, row by row from the top, and these tags; where the strips lie is filled in.
 * @throws RangeError above 4 GB
 */
export function assembleTiff(strips: readonly Uint8Array[], tags: readonly TiffTag[]): Uint8Array {
  let pixelsEnd = HEADER;
  const offsets = strips.map((strip) => {
    const at = pixelsEnd;
    pixelsEnd += strip.length;
    return at;
  });
  const all: TiffTag[] = [
    ...tags,
    { id: STRIP_OFFSETS, type: LONG, values: offsets },
    { id: STRIP_BYTE_COUNTS, type: LONG, values: strips.map((strip) => strip.length) },
  ];
  all.sort((a, b) => a.id - b.id);
  const directoryAt = even(pixelsEnd);
  let next = directoryAt + 2 + 12 * all.length + 4;
  const size = all.reduce((sum, tag) => sum + (sizeOf(tag) > 4 ? even(sizeOf(tag)) : 0), next);
  if (size >= LARGEST) throw new RangeError('A TIFF file holds at most 4 GB: choose a smaller map.');
  const file = new Uint8Array(size);
  strips.forEach((strip, i) => {
    file.set(strip, offsets[i]!);
  });
  const view = new DataView(file.buffer);
  view.setUint16(0, 0x4949, true);
  view.setUint16(2, 42, true);
  view.setUint32(4, directoryAt, true);
  view.setUint16(directoryAt, all.length, true);
  all.forEach((tag, i) => {
    const at = directoryAt + 2 + 12 * i;
    view.setUint16(at, tag.id, true);
    view.setUint16(at + 2, tag.type, true);
    view.setUint32(at + 4, tag.values.length, true);
    if (sizeOf(tag) > 4) {
      view.setUint32(at + 8, next, true);
      writeValues(view, next, tag);
      next += even(sizeOf(tag));
    } else {
      writeValues(view, at + 8, tag);
    }
  });
  return file;
}

function writeValues(view: DataView, at: number, { type, values }: TiffTag): void {
  values.forEach((value, i) => {
    const place = at + i * BYTES_OF[type];
    if (type === SHORT) view.setUint16(place, value, true);
    else if (type === LONG) view.setUint32(place, value, true);
    else if (type === DOUBLE) view.setFloat64(place, value, true);
    else view.setUint8(place, value);
  });
}

function sizeOf({ type, values }: TiffTag): number {
  return values.length * BYTES_OF[type];
}

/** Tag values begin on an even byte. */
function even(size: number): number {
  return size + (size % 2);
}
