import type { RgbEncoding } from '../colour/types.ts';
import { exifOrientation, type Orientation, swapsSides } from './exifOrientation.ts';
import { readExif } from './metadata.ts';
import { photoColour } from './photoColour.ts';
import { refusal } from './refusal.ts';
import { sniff } from './sniff.ts';
import type { SniffedPhoto } from './sniffed.ts';
import { PhotoError, type PhotoMetadata } from './types.ts';

/** All that is known of a photo before its pixels are decoded: the same in the browser and in Node. */
export interface InspectedPhoto {
  readonly sniffed: SniffedPhoto;
  /** What is left to do to the decoded pixels; 1 for AVIF and HEIC, whose decoders turn the picture themselves. */
  readonly orientation: Orientation;
  readonly encoding: RgbEncoding;
  readonly metadata: PhotoMetadata;
  readonly notices: readonly string[];
}

/**
 * Reads a photo's structure, colours and metadata.
 * @param sha256 lower-case hexadecimal, of `bytes`
 * @throws PhotoError where the file is not a photo that can be measured
 */
export async function inspectPhoto(
  bytes: Uint8Array,
  fileName: string,
  sha256: string,
): Promise<InspectedPhoto> {
  const sniffed = sniff(bytes);
  const refused = refusal(sniffed, bytes.length);
  if (refused) throw new PhotoError(refused);
  const exif = await readExif(bytes, sniffed.exif);
  const colour = photoColour(sniffed, exif.dcfOptionFile);
  const turnsItself = sniffed.format === 'avif' || sniffed.format === 'heic';
  const orientation = turnsItself ? 1 : (exifOrientation(bytes, sniffed.exif)?.orientation ?? 1);
  const swapped = swapsSides(orientation);
  return {
    sniffed,
    orientation,
    encoding: colour.encoding,
    metadata: {
      ...exif.fields,
      fileName,
      mimeType: sniffed.mimeType,
      byteLength: bytes.length,
      sha256,
      originalWidth: swapped ? sniffed.height : sniffed.width,
      originalHeight: swapped ? sniffed.width : sniffed.height,
      profileName: colour.profileName,
    },
    notices: [...colour.notices, ...exif.notices],
  };
}
