import { Unzlib } from 'fflate';
import { ascii, type ByteRange, u16be, u32be } from './bytes.ts';
import type { ColourTag, SniffedPhoto } from './sniffed.ts';

/** A profile larger than this is not one: guards against a small file that unpacks without end. */
const MAX_PROFILE_BYTES = 8 << 20;

const COLOUR_MODELS = ['grey', 'unknown', 'rgb', 'indexed', 'grey', 'unknown', 'rgb'] as const;

/** PNG chunks (PNG, third edition, 2025: 11.2 IHDR, 11.3.2 colour chunks, 11.3.4.5 eXIf). */
export function sniffPng(bytes: Uint8Array): SniffedPhoto {
  const colourType = bytes[25] ?? 0;
  let hasAlpha = (colourType & 4) !== 0;
  let exif: ByteRange | undefined;
  let exifContainer: ByteRange | undefined;
  let complete = false;
  let tag: ColourTag = {};

  let at = 8;
  while (at + 12 <= bytes.length) {
    const length = u32be(bytes, at);
    const type = ascii(bytes, at + 4, 4);
    const body = at + 8;
    const end = body + length + 4;
    if (end > bytes.length) break;
    if (type === 'IEND') {
      complete = true;
      break;
    }
    if (type === 'tRNS') hasAlpha = true;
    else if (type === 'cICP')
      tag = { ...tag, codePoints: { primaries: bytes[body]!, transfer: bytes[body + 1]! } };
    else if (type === 'iCCP') tag = { ...tag, ...unpackProfile(bytes.subarray(body, body + length)) };
    else if (type === 'sRGB') tag = { ...tag, statedSrgb: true };
    else if (type === 'gAMA') tag = { ...tag, gamma: u32be(bytes, body) / 100000 };
    else if (type === 'cHRM' && length >= 32)
      tag = {
        ...tag,
        chromaticities: Array.from({ length: 8 }, (_, i) => u32be(bytes, body + 4 * i) / 100000),
      };
    else if (type === 'eXIf' && !exif) {
      exif = { offset: body, length };
      exifContainer = { offset: at, length: end - at };
    }
    at = end;
  }
  return {
    format: 'png',
    mimeType: 'image/png',
    width: u32be(bytes, 16),
    height: u32be(bytes, 20),
    bitDepth: bytes[24] ?? 8,
    colourModel: COLOUR_MODELS[colourType] ?? 'unknown',
    hasAlpha,
    colour: tag,
    ...(exif && { exif }),
    ...(exifContainer && { exifContainer }),
    complete,
  };
}

/** `iCCP`: a name, a zero, the method (0), then the profile deflated. */
function unpackProfile(chunk: Uint8Array): ColourTag {
  const nameEnd = chunk.indexOf(0);
  if (nameEnd < 0 || u16be(chunk, nameEnd) !== 0) return { iccDamaged: true };
  const pieces: Uint8Array[] = [];
  let total = 0;
  let finished = false;
  try {
    const stream = new Unzlib((piece, final) => {
      pieces.push(piece);
      total += piece.length;
      finished = final;
    });
    // In small bites, so that the size is checked before much has been unpacked (deflate gives at most 1032 to 1).
    const packed = chunk.subarray(nameEnd + 2);
    for (let at = 0; at < packed.length && total <= MAX_PROFILE_BYTES; at += 4096)
      stream.push(packed.subarray(at, at + 4096), at + 4096 >= packed.length);
  } catch {
    return { iccDamaged: true };
  }
  if (!finished || total > MAX_PROFILE_BYTES) return { iccDamaged: true };
  const icc = new Uint8Array(total);
  let at = 0;
  for (const piece of pieces) {
    icc.set(piece, at);
    at += piece.length;
  }
  return { icc };
}
