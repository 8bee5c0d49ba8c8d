import { type ByteRange, u16be, u16le, u32be, u32le } from './bytes.ts';

/** EXIF orientation, 1 to 8 (CIPA DC-008-2019, 4.6.4, tag 274): where row 0 and column 0 of the stored grid are. */
export type Orientation = 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8;

/**
 * Orientation in the first directory of an EXIF block, and the place of its two bytes in the file (so that a browser can
 * be handed a copy that says 1). Undefined where there is none, or it is not 1 to 8.
 */
export function exifOrientation(
  bytes: Uint8Array,
  exif: ByteRange | undefined,
): { orientation: Orientation; at: number; littleEndian: boolean } | undefined {
  if (!exif) return undefined;
  const start = exif.offset;
  const end = Math.min(start + exif.length, bytes.length);
  const mark = u16be(bytes, start);
  if (mark !== 0x4949 && mark !== 0x4d4d) return undefined;
  const littleEndian = mark === 0x4949;
  const u16 = littleEndian ? u16le : u16be;
  const u32 = littleEndian ? u32le : u32be;
  const directory = start + u32(bytes, start + 4);
  const count = u16(bytes, directory);
  for (let i = 0; i < count; i++) {
    const entry = directory + 2 + 12 * i;
    if (entry + 12 > end) return undefined;
    if (u16(bytes, entry) !== 0x0112) continue;
    const value = u16(bytes, entry + 8);
    if (value < 1 || value > 8) return undefined;
    return { orientation: value as Orientation, at: entry + 8, littleEndian };
  }
  return undefined;
}

/** Whether an orientation swaps width and height. */
export const swapsSides = (orientation: Orientation): boolean => orientation >= 5;
