import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import sharp from 'sharp';
import { assemblePhoto } from '../photo/assemble.ts';
import { type InspectedPhoto, inspectPhoto } from '../photo/inspect.ts';
import { DAMAGED_SENTENCE, HEIC_SENTENCE } from '../photo/refusal.ts';
import { type DecodedPhoto, PhotoError } from '../photo/types.ts';

export interface DecodeOptions {
  /** Photos above this many pixels are shrunk to fit; none are where it is absent. */
  readonly maxPixels?: number;
}

/**
 * Opens a photo file: JPEG, PNG (8 and 16 bit), WebP or AVIF, upright, with the file's own code values.
 * @throws PhotoError with one sentence that says what to do
 */
export async function decodePhotoFile(path: string, options: DecodeOptions = {}): Promise<DecodedPhoto> {
  let bytes: Uint8Array;
  try {
    bytes = await readFile(path);
  } catch (cause) {
    const reason =
      (cause as NodeJS.ErrnoException).code === 'ENOENT' ? 'there is no such file' : String(cause);
    throw new PhotoError(`${path} cannot be read: ${reason}.`);
  }
  return decodePhotoBytes(bytes, basename(path), options);
}

/** The same for bytes in memory. */
export async function decodePhotoBytes(
  bytes: Uint8Array,
  fileName: string,
  options: DecodeOptions = {},
): Promise<DecodedPhoto> {
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  const photo = await inspectPhoto(bytes, fileName, sha256);
  if (photo.sniffed.format === 'heic') throw new PhotoError(HEIC_SENTENCE);
  const raw = await decodeStored(bytes, photo);
  const assembly = assemblePhoto(photo, raw, options.maxPixels ?? Number.POSITIVE_INFINITY);
  assembly.push(raw.codes, raw.height);
  return assembly.finish();
}

interface StoredPixels {
  readonly width: number;
  readonly height: number;
  readonly channels: 3;
  readonly maxCode: 255 | 65535;
  readonly codes: Uint8Array | Uint16Array;
}

/** Pixels as stored: no turning, no profile conversion, no change of depth; grey repeated, a fourth channel dropped. */
async function decodeStored(bytes: Uint8Array, photo: InspectedPhoto): Promise<StoredPixels> {
  const deep = photo.sniffed.format === 'png' && photo.sniffed.bitDepth === 16;
  try {
    const { data, info } = await sharp(bytes, {
      ignoreIcc: true,
      // Phones write files with harmless oddities (stray bytes before a marker): warnings must not stop a photo.
      failOn: 'error',
      limitInputPixels: false,
    })
      .toColourspace(deep ? 'rgb16' : 'srgb')
      .removeAlpha()
      .raw({ depth: deep ? 'ushort' : 'uchar' })
      .toBuffer({ resolveWithObject: true });
    const codes = deep ? new Uint16Array(data.buffer, data.byteOffset, data.length / 2) : data;
    if (info.channels !== 3) throw new PhotoError(DAMAGED_SENTENCE);
    return { width: info.width, height: info.height, channels: 3, maxCode: deep ? 65535 : 255, codes };
  } catch (cause) {
    if (cause instanceof PhotoError) throw cause;
    throw new PhotoError(DAMAGED_SENTENCE, { cause });
  }
}
