import type { RgbEncoding } from '../colour/types.ts';

/** Upright pixels as the file recorded them (EXIF orientation applied, no colour conversion). */
export interface PhotoPixels {
  readonly width: number;
  readonly height: number;
  /** Interleaved code values, `channels` a pixel, row by row from the top left. */
  readonly codes: Uint8Array | Uint8ClampedArray | Uint16Array;
  /** 3 = RGB, 4 = RGB and an ignored fourth. */
  readonly channels: 3 | 4;
  /** Largest code: 255 for 8 bit, 65535 for 16 bit. */
  readonly maxCode: 255 | 65535;
  readonly encoding: RgbEncoding;
}

/** What the file says of itself. Absent means the file did not say. */
export interface PhotoMetadata {
  readonly fileName: string;
  readonly mimeType: string;
  readonly byteLength: number;
  /** Lower-case hexadecimal SHA-256 of the original bytes. */
  readonly sha256: string;
  /** Upright size of the original, before any shrinking. */
  readonly originalWidth: number;
  readonly originalHeight: number;
  /** ISO 8601 with offset or Z where the file gives one; without either where it does not. */
  readonly takenAt?: string;
  readonly takenAtHasOffset: boolean;
  /** WGS 84. */
  readonly position?: {
    readonly latitudeDeg: number;
    readonly longitudeDeg: number;
    readonly errorM?: number;
  };
  readonly altitudeM?: number;
  readonly headingDeg?: number;
  readonly headingReference?: 'true' | 'magnetic';
  /** Camera tilt above the horizontal, degrees (EXIF CameraElevationAngle). */
  readonly elevationDeg?: number;
  readonly focalLength35mm?: number;
  readonly focalLengthMm?: number;
  readonly exposureTimeS?: number;
  readonly fNumber?: number;
  readonly iso?: number;
  readonly whiteBalance?: 'auto' | 'manual';
  readonly cameraMake?: string;
  readonly cameraModel?: string;
  readonly profileName: string;
}

export interface DecodedPhoto {
  readonly pixels: PhotoPixels;
  readonly metadata: PhotoMetadata;
  /** Decoded width / original width; below 1 where the photo was shrunk on opening. */
  readonly scale: number;
  /** Sentences a person should read about this file (shrunk, no offset on the clock, unknown profile ...). */
  readonly notices: readonly string[];
}

/** Why a photo could not be opened, in one sentence that says what to do. */
export class PhotoError extends Error {
  override readonly name = 'PhotoError';
}
