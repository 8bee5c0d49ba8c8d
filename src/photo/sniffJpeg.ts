import { ascii, type ByteRange, u16be } from './bytes.ts';
import type { SniffedPhoto } from './sniffed.ts';

/**
 * JPEG markers (ITU-T T.81, annex B): size and components from the frame header, EXIF from APP1, the profile from APP2
 * (ICC.1:2022, annex B.4, several segments), ink colours from the Adobe APP14, and whether the end marker is there.
 */
export function sniffJpeg(bytes: Uint8Array): SniffedPhoto {
  let width = 0;
  let height = 0;
  let components = 3;
  let bitDepth = 8;
  let exif: ByteRange | undefined;
  let complete = false;
  const profile: { part: number; count: number; range: ByteRange }[] = [];

  let at = 2;
  while (at < bytes.length) {
    if (bytes[at] !== 0xff) {
      at = bytes.indexOf(0xff, at);
      if (at < 0) break;
    }
    const marker = bytes[at + 1];
    if (marker === undefined) break;
    if (marker === 0xd9) {
      complete = width > 0;
      break;
    }
    // Fill bytes, stuffed zeros, restart and other markers without a length: all that lies inside a scan.
    if (marker === 0xff || marker === 0 || marker === 1 || (marker >= 0xd0 && marker <= 0xd8)) {
      at += marker === 0xff ? 1 : 2;
      continue;
    }
    const body = at + 4;
    const length = u16be(bytes, at + 2) - 2;
    if (length < 0) break;
    const isFrame = marker >= 0xc0 && marker <= 0xcf && marker !== 0xc4 && marker !== 0xc8 && marker !== 0xcc;
    if (isFrame && width === 0) {
      bitDepth = bytes[body] ?? 8;
      height = u16be(bytes, body + 1);
      width = u16be(bytes, body + 3);
      components = bytes[body + 5] ?? 3;
    } else if (marker === 0xe1 && !exif && ascii(bytes, body, 4) === 'Exif') {
      exif = { offset: body + 6, length: Math.max(0, length - 6) };
    } else if (marker === 0xe2 && ascii(bytes, body, 11) === 'ICC_PROFILE') {
      const range = { offset: body + 14, length: length - 14 };
      profile.push({ part: bytes[body + 12] ?? 0, count: bytes[body + 13] ?? 0, range });
    }
    at = body + length;
  }
  const icc = joinProfile(bytes, profile);
  return {
    format: 'jpeg',
    mimeType: 'image/jpeg',
    width,
    height,
    bitDepth,
    colourModel: components === 3 ? 'rgb' : components === 1 ? 'grey' : components === 4 ? 'cmyk' : 'unknown',
    hasAlpha: false,
    colour: icc ? { icc } : profile.length > 0 ? { iccDamaged: true } : {},
    ...(exif && { exif }),
    complete,
  };
}

function joinProfile(
  bytes: Uint8Array,
  parts: readonly { part: number; count: number; range: ByteRange }[],
): Uint8Array | undefined {
  const count = parts[0]?.count ?? 0;
  const inOrder = [...parts].sort((a, b) => a.part - b.part);
  if (count === 0 || inOrder.length !== count || inOrder.some(({ part }, index) => part !== index + 1))
    return undefined;
  const pieces = inOrder.map(({ range }) => bytes.subarray(range.offset, range.offset + range.length));
  const joined = new Uint8Array(pieces.reduce((sum, piece) => sum + piece.length, 0));
  let at = 0;
  for (const piece of pieces) {
    joined.set(piece, at);
    at += piece.length;
  }
  return joined;
}
