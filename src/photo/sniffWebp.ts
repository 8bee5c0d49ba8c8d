import { ascii, type ByteRange, u16le, u32le } from './bytes.ts';
import type { SniffedPhoto } from './sniffed.ts';

/** WebP container (RFC 9649, section 2): RIFF chunks VP8, VP8L, VP8X, ICCP, EXIF. */
export function sniffWebp(bytes: Uint8Array): SniffedPhoto {
  let width = 0;
  let height = 0;
  let hasAlpha = false;
  let icc: Uint8Array | undefined;
  let exif: ByteRange | undefined;

  const riffEnd = 8 + u32le(bytes, 4);
  let at = 12;
  while (at + 8 <= Math.min(riffEnd, bytes.length)) {
    const type = ascii(bytes, at, 4);
    const length = u32le(bytes, at + 4);
    const body = at + 8;
    if (type === 'VP8X') {
      hasAlpha = ((bytes[body] ?? 0) & 0x10) !== 0;
      width = 1 + u16le(bytes, body + 4) + ((bytes[body + 6] ?? 0) << 16);
      height = 1 + u16le(bytes, body + 7) + ((bytes[body + 9] ?? 0) << 16);
    } else if (type === 'VP8 ' && width === 0) {
      width = u16le(bytes, body + 6) & 0x3fff;
      height = u16le(bytes, body + 8) & 0x3fff;
    } else if (type === 'VP8L' && width === 0) {
      const packed = u32le(bytes, body + 1);
      width = 1 + (packed & 0x3fff);
      height = 1 + ((packed >>> 14) & 0x3fff);
      hasAlpha = ((packed >>> 28) & 1) === 1;
    } else if (type === 'ICCP') icc = bytes.subarray(body, body + length);
    else if (type === 'EXIF' && !exif) {
      // Some writers leave the JPEG prefix in front of the TIFF header.
      const skip = ascii(bytes, body, 4) === 'Exif' ? 6 : 0;
      exif = { offset: body + skip, length: Math.max(0, length - skip) };
    }
    at = body + length + (length & 1);
  }
  return {
    format: 'webp',
    mimeType: 'image/webp',
    width,
    height,
    bitDepth: 8,
    colourModel: 'rgb',
    hasAlpha,
    colour: icc ? { icc } : {},
    ...(exif && { exif }),
    complete: riffEnd <= bytes.length && width > 0,
  };
}
