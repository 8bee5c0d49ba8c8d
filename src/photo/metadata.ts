/// <reference path="./exifr.d.ts" />
import type { Directory, TagValue } from 'exifr/dist/mini.esm.mjs';
import type { ByteRange } from './bytes.ts';
import { isoTime } from './exifTime.ts';
import type { PhotoMetadata } from './types.ts';

/** The part of the metadata that EXIF gives. */
export type ExifFields = Partial<
  Omit<
    PhotoMetadata,
    'fileName' | 'mimeType' | 'byteLength' | 'sha256' | 'originalWidth' | 'originalHeight' | 'profileName'
  >
> & { readonly takenAtHasOffset: boolean };

export interface ExifReading {
  readonly fields: ExifFields;
  /** DCF option file (`R03`): Adobe RGB colours without a profile (CIPA DC-009-2010, 6). */
  readonly dcfOptionFile: boolean;
  readonly notices: readonly string[];
}

const NOTHING: ExifReading = { fields: { takenAtHasOffset: false }, dcfOptionFile: false, notices: [] };

/**
 * Reads an EXIF block (tags: CIPA DC-008-2019). Values that cannot be true are dropped with a notice; a block that
 * cannot be read at all gives none and a notice. Never rejects.
 */
export async function readExif(bytes: Uint8Array, exif: ByteRange | undefined): Promise<ExifReading> {
  if (!exif) return NOTHING;
  try {
    const { parse } = await import('exifr/dist/mini.esm.mjs');
    const output = await parse(asJpeg(bytes, exif), {
      tiff: true,
      ifd0: true,
      exif: true,
      gps: true,
      interop: true,
      ifd1: false,
      translateKeys: false,
      translateValues: false,
      reviveValues: false,
      mergeOutput: false,
    });
    // exifr passes over what it cannot follow: a block from which nothing came out was not readable.
    if (output && (output.ifd0 || output.exif || output.gps))
      return interpret(output.ifd0 ?? {}, output.exif ?? {}, output.gps ?? {}, output.interop ?? {});
  } catch {
    // What exifr says of a broken block means nothing to a photographer; the sentence below does.
  }
  return {
    ...NOTHING,
    notices: ['The camera data (EXIF) in this photo cannot be read: enter place, time and lens by hand.'],
  };
}

/** exifr's small build reads EXIF inside a JPEG only, so the block of any format gets the shortest JPEG around it. */
function asJpeg(bytes: Uint8Array, { offset, length }: ByteRange): Uint8Array {
  const block = bytes.subarray(offset, offset + Math.min(length, 65535 - 8));
  const out = new Uint8Array(block.length + 14);
  const segment = block.length + 8;
  out.set([0xff, 0xd8, 0xff, 0xe1, segment >> 8, segment & 255, 0x45, 0x78, 0x69, 0x66, 0, 0]);
  out.set(block, 12);
  out.set([0xff, 0xd9], block.length + 12);
  return out;
}

function interpret(ifd0: Directory, exif: Directory, gps: Directory, interop: Directory): ExifReading {
  const notices: string[] = [];
  /** A number within bounds; one outside is dropped and named. `blank` is the value that EXIF itself uses for "unknown". */
  const within = (
    value: TagValue | undefined,
    low: number,
    high: number,
    name: string,
    blank?: number,
  ): number | undefined => {
    if (value === undefined) return undefined;
    const number = firstNumber(value);
    if (number === blank) return undefined;
    if (number >= low && number <= high) return number;
    notices.push(`The ${name} in this photo cannot be right and is left out.`);
    return undefined;
  };

  const time = readTime(exif, notices);
  const position = readPosition(gps, notices);
  const below = firstNumber(gps[5] ?? 0) === 1 ? -1 : 1;
  const altitude = within(gps[6], 0, 20_000, 'altitude');
  const heading = within(gps[17], 0, 360, 'compass direction');
  const headingReference = text(gps[16]);
  const errorM = within(gps[31], 0, 1e6, 'position error');
  const elevationDeg = within(exif[0x9405], -180, 180, 'camera tilt');
  const focalLengthMm = within(exif[0x920a], 0.1, 10_000, 'focal length', 0);
  const focalLength35mm = within(exif[0xa405], 1, 10_000, '35 mm focal length', 0);
  const exposureTimeS = within(exif[0x829a], 1e-7, 1e6, 'exposure time', 0);
  const fNumber = within(exif[0x829d], 0.3, 1000, 'f-number', 0);
  // 65535 in the 16-bit tag means "see the 32-bit one" (4.6.5.E).
  const shortIso = exif[0x8827];
  const wideIso = exif[0x8833] ?? exif[0x8832] ?? exif[0x8831];
  const isWide = shortIso !== undefined && firstNumber(shortIso) === 65535;
  const iso = within(isWide ? wideIso : shortIso, 1, 1e8, 'ISO speed', 0);
  const balance = exif[0xa403] === undefined ? undefined : firstNumber(exif[0xa403]);
  const cameraMake = text(ifd0[0x010f]);
  const cameraModel = text(ifd0[0x0110]);

  return {
    notices,
    dcfOptionFile: text(interop[1]) === 'R03',
    fields: {
      takenAtHasOffset: time?.hasOffset ?? false,
      ...(time && { takenAt: time.text }),
      ...(position && { position: errorM === undefined ? position : { ...position, errorM } }),
      ...(altitude !== undefined && { altitudeM: below * altitude }),
      ...(heading !== undefined && { headingDeg: heading % 360 }),
      ...(heading !== undefined && headingReference === 'T' && { headingReference: 'true' as const }),
      ...(heading !== undefined && headingReference === 'M' && { headingReference: 'magnetic' as const }),
      ...(elevationDeg !== undefined && { elevationDeg }),
      ...(focalLengthMm !== undefined && { focalLengthMm }),
      ...(focalLength35mm !== undefined && { focalLength35mm }),
      ...(exposureTimeS !== undefined && { exposureTimeS }),
      ...(fNumber !== undefined && { fNumber }),
      ...(iso !== undefined && { iso }),
      ...(balance === 0 && { whiteBalance: 'auto' as const }),
      ...(balance === 1 && { whiteBalance: 'manual' as const }),
      ...(cameraMake && { cameraMake }),
      ...(cameraModel && { cameraModel }),
    },
  };
}

function readTime(exif: Directory, notices: string[]): { text: string; hasOffset: boolean } | undefined {
  // Taken, else digitised; never the time of the last change, which an editor sets.
  const original = text(exif[0x9003]);
  const date = original || text(exif[0x9004]);
  if (!date || /^[\s:0]*$/.test(date)) return undefined;
  const time = original
    ? isoTime(date, text(exif[0x9011]), text(exif[0x9291]))
    : isoTime(date, text(exif[0x9012]), text(exif[0x9292]));
  if (!time) notices.push('The date in this photo cannot be right and is left out.');
  else if (!time.hasOffset)
    notices.push("The photo's clock gives no time zone: state it before the time is handed on.");
  return time;
}

function readPosition(
  gps: Directory,
  notices: string[],
): { latitudeDeg: number; longitudeDeg: number } | undefined {
  if (gps[2] === undefined || gps[4] === undefined) return undefined;
  const latitudeDeg = degrees(gps[2], text(gps[1]), 'N', 'S');
  const longitudeDeg = degrees(gps[4], text(gps[3]), 'E', 'W');
  if (!(Math.abs(latitudeDeg) <= 90 && Math.abs(longitudeDeg) <= 180)) {
    notices.push('The position in this photo cannot be right and is left out.');
    return undefined;
  }
  if (latitudeDeg === 0 && longitudeDeg === 0) {
    notices.push('The position in this photo is 0°, 0°, which cameras write when they have none: left out.');
    return undefined;
  }
  return { latitudeDeg, longitudeDeg };
}

/** Degrees, minutes, seconds; NaN where a part is missing or the hemisphere is not stated. */
function degrees(value: TagValue, reference: string, positive: string, negative: string): number {
  if (typeof value === 'string' || typeof value === 'number' || value.length < 3) return Number.NaN;
  const sign = reference === positive ? 1 : reference === negative ? -1 : Number.NaN;
  return sign * (value[0]! + value[1]! / 60 + value[2]! / 3600);
}

const firstNumber = (value: TagValue): number =>
  typeof value === 'number' ? value : typeof value === 'string' ? Number.NaN : (value[0] ?? Number.NaN);

const text = (value: TagValue | undefined): string =>
  typeof value === 'string' ? value.replace(/\0[\s\S]*$/, '').trim() : '';
