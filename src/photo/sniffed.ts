import type { ByteRange } from './bytes.ts';

export type PhotoFormat = 'jpeg' | 'png' | 'webp' | 'avif' | 'heic' | 'tiff' | 'gif' | 'unknown';

/** What the file's own structure says about its colours, before any of it is believed. */
export interface ColourTag {
  /** Embedded ICC profile, inflated. */
  readonly icc?: Uint8Array;
  /** The file holds a profile that could not be unpacked. */
  readonly iccDamaged?: boolean;
  /** Code points of ITU-T H.273 (`colr` `nclx`, PNG `cICP`): colour primaries and transfer characteristics. */
  readonly codePoints?: { readonly primaries: number; readonly transfer: number };
  /** PNG `sRGB` chunk. */
  readonly statedSrgb?: boolean;
  /** PNG `gAMA`: code = linear ^ gamma. */
  readonly gamma?: number;
  /** PNG `cHRM`: white x, y, then red, green, blue x, y. */
  readonly chromaticities?: readonly number[];
}

export interface SniffedPhoto {
  readonly format: PhotoFormat;
  readonly mimeType: string;
  /** Size of the pixel grid as stored (JPEG, PNG, WebP) or as every decoder shows it (AVIF, HEIC); 0 where unknown. */
  readonly width: number;
  readonly height: number;
  readonly bitDepth: number;
  readonly colourModel: 'rgb' | 'grey' | 'indexed' | 'cmyk' | 'unknown';
  readonly hasAlpha: boolean;
  readonly colour: ColourTag;
  /** The EXIF block, from its TIFF header on. */
  readonly exif?: ByteRange;
  /** Where the whole container part that holds it lies (PNG: chunk with length and checksum). */
  readonly exifContainer?: ByteRange;
  /** False where the file ends before its own structure does. */
  readonly complete: boolean;
}
