import { apply3, bradford, invert3, type Matrix3, multiply3, type Triple } from '../colour/matrix3.ts';
import type { RgbEncoding } from '../colour/types.ts';
import { ascii, s15Fixed16, u16be, u32be } from './bytes.ts';
import { inverseCurve, type ToneCurve, toneCurve } from './iccCurve.ts';
import { KNOWN_ENCODINGS, orUndefined, PCS_WHITE, untagged } from './knownEncodings.ts';

/** What an embedded profile turned out to be. `notices` are sentences for a person. */
export interface ProfileReading {
  readonly kind: 'rgb' | 'grey' | 'cmyk' | 'other' | 'damaged';
  readonly description: string;
  /** For 'cmyk', and wherever the profile is no use, the sRGB encoding: a caller that goes on says so by the notices. */
  readonly encoding: RgbEncoding;
  readonly notices: readonly string[];
}

/**
 * Largest difference, in XYZ and in linear light, up to which a profile counts as one of the known encodings. One step of
 * the profile's own numbers is 1.5e-5, and profiles of the same space differ by more: the blue column of the sRGB profile
 * in circulation since 1998 ends in 0.7141, the adapted primaries give 0.7139. The nearest curve that is really another,
 * a plain power of 2.2, is 8.5e-3 away; the nearest primaries are 7e-2 away.
 */
const SAME = 5e-4;

/**
 * Reads a version 2 or 4 profile of the matrix and tone-curve kind (ICC.1:2022, 8.3.3; ICC.1:2001-04, 6.3.1.2).
 * The matrix comes back for the profile's own white: the adaptation to the D50 of the connection space is undone by
 * the `chad` tag, else by Bradford from the media white where that is not D50. A profile that was only ever stated
 * for D50 keeps `whiteXyz` at D50: adapt before comparing with colours of another white.
 */
export function readIccProfile(profile: Uint8Array): ProfileReading {
  const unusable = (kind: ProfileReading['kind'], description: string, notice: string): ProfileReading => ({
    kind,
    description,
    encoding: untagged,
    notices: [notice],
  });
  const tags = readTags(profile);
  if (!tags)
    return unusable(
      'damaged',
      'damaged',
      'The colour profile in this photo is damaged; its colours are read as sRGB.',
    );
  const description = readDescription(profile, tags.get('desc')) || 'unnamed profile';
  const space = ascii(profile, 16, 4);
  if (space === 'CMYK')
    return unusable('cmyk', description, 'This picture is stored in printing inks (CMYK).');
  if (space === 'GRAY') return readGrey(profile, tags, description);
  if (space !== 'RGB ')
    return unusable(
      'other',
      description,
      `The colour profile "${description}" is not an RGB profile; the colours are read as sRGB.`,
    );

  const toPcs = columns(profile, tags);
  const curves = ['rTRC', 'gTRC', 'bTRC'].map((tag) => curveAt(profile, tags.get(tag)));
  const green = curves[1];
  // A matrix that gives white no brightness is as good as none.
  const usable = toPcs && orUndefined(() => invert3(toPcs)) && toPcs[3]! + toPcs[4]! + toPcs[5]! > 0.1;
  if (!usable || !green || !curves[0] || !curves[2])
    return unusable(
      'other',
      description,
      `The colour profile "${description}" holds only look-up tables, which this app does not read; the colours are read as sRGB.`,
    );
  for (const known of KNOWN_ENCODINGS) {
    const sameTone = curves.every((curve) => distance(curve!, known.decode) < SAME);
    if (sameTone && colourDistance(toPcs, known) < SAME)
      return { kind: 'rgb', description, encoding: known, notices: [] };
  }
  const uneven = Math.max(distance(curves[0], green), distance(curves[2], green)) > SAME;
  return {
    kind: 'rgb',
    description,
    encoding: ownEncoding(profile, tags, toPcs, green, description),
    notices: uneven
      ? [`The colour profile "${description}" has a tone curve for each channel; green's is used for all.`]
      : [],
  };
}

function ownEncoding(
  profile: Uint8Array,
  tags: Tags,
  toPcs: Matrix3,
  decode: ToneCurve,
  id: string,
): RgbEncoding {
  const matrix = multiply3(nativeWhite(profile, tags), toPcs);
  const [x, y, z] = apply3(matrix, [1, 1, 1]);
  return {
    id,
    toXyz: matrix.map((value) => value / y),
    whiteXyz: [x / y, 1, z / y],
    decode,
    encode: inverseCurve(decode),
  };
}

/** From the connection space's D50 to the white that the encoding was made for. */
function nativeWhite(profile: Uint8Array, tags: Tags): Matrix3 {
  const chad = tags.get('chad');
  if (chad !== undefined && u32be(profile, chad) === 0x73663332 /* sf32 */) {
    const adapted = Float64Array.from({ length: 9 }, (_, i) => s15Fixed16(profile, chad + 8 + 4 * i));
    const back = orUndefined(() => invert3(adapted));
    if (back) return back;
  }
  const white = tags.get('wtpt');
  const media: Triple = white === undefined ? PCS_WHITE : xyzAt(profile, white);
  return media.every((value) => value > 0.2 && value < 2)
    ? bradford(PCS_WHITE, media)
    : bradford(PCS_WHITE, PCS_WHITE);
}

function readGrey(profile: Uint8Array, tags: Tags, description: string): ProfileReading {
  const curve = curveAt(profile, tags.get('kTRC'));
  const notices = ['This picture has no colour (grey only): film colours cannot be read from it.'];
  if (!curve || distance(curve, untagged.decode) < SAME)
    return { kind: 'grey', description, encoding: untagged, notices };
  return {
    kind: 'grey',
    description,
    encoding: { ...untagged, id: description, decode: curve, encode: inverseCurve(curve) },
    notices,
  };
}

type Tags = ReadonlyMap<string, number>;

/** Tag signature to offset; undefined where the header or the table does not hold together. */
function readTags(profile: Uint8Array): Tags | undefined {
  const count = u32be(profile, 128);
  if (profile.length < 132 || ascii(profile, 36, 4) !== 'acsp' || 132 + 12 * count > profile.length)
    return undefined;
  const tags = new Map<string, number>();
  for (let i = 0; i < count; i++) {
    const entry = 132 + 12 * i;
    const offset = u32be(profile, entry + 4);
    if (offset + u32be(profile, entry + 8) <= profile.length) tags.set(ascii(profile, entry, 4), offset);
  }
  return tags;
}

const xyzAt = (profile: Uint8Array, at: number): Triple => [
  s15Fixed16(profile, at + 8),
  s15Fixed16(profile, at + 12),
  s15Fixed16(profile, at + 16),
];

function columns(profile: Uint8Array, tags: Tags): Matrix3 | undefined {
  const [r, g, b] = ['rXYZ', 'gXYZ', 'bXYZ'].map((tag) => tags.get(tag));
  if (r === undefined || g === undefined || b === undefined) return undefined;
  const [red, green, blue] = [xyzAt(profile, r), xyzAt(profile, g), xyzAt(profile, b)];
  return Float64Array.of(red[0], green[0], blue[0], red[1], green[1], blue[1], red[2], green[2], blue[2]);
}

const curveAt = (profile: Uint8Array, at: number | undefined): ToneCurve | undefined =>
  at === undefined ? undefined : toneCurve(profile, at);

/** Largest difference of two tone curves in linear light, on 256 codes. */
function distance(a: ToneCurve, b: ToneCurve): number {
  let largest = 0;
  for (let code = 0; code <= 255; code++) {
    const difference = Math.abs(a(code / 255) - b(code / 255));
    if (!(difference <= largest)) largest = difference;
  }
  return largest;
}

function colourDistance(toPcs: Matrix3, known: RgbEncoding): number {
  const knownToPcs = multiply3(bradford(known.whiteXyz, PCS_WHITE), known.toXyz);
  return Math.max(...knownToPcs.map((value, index) => Math.abs(value - toPcs[index]!)));
}

/** `textDescriptionType` (version 2) or `multiLocalizedUnicodeType` (version 4; English where there is a choice). */
function readDescription(profile: Uint8Array, at: number | undefined): string {
  if (at === undefined) return '';
  const type = ascii(profile, at, 4);
  let text = '';
  if (type === 'desc') text = ascii(profile, at + 12, Math.min(u32be(profile, at + 8), 256));
  if (type === 'mluc') {
    const records = Math.min(u32be(profile, at + 8), 100);
    let record = at + 16;
    for (let i = 0; i < records; i++)
      if (ascii(profile, at + 16 + 12 * i, 2) === 'en') {
        record = at + 16 + 12 * i;
        break;
      }
    const start = at + u32be(profile, record + 8);
    const end = Math.min(start + Math.min(u32be(profile, record + 4), 512), profile.length - 1);
    for (let i = start; i < end; i += 2) text += String.fromCharCode(u16be(profile, i));
  }
  return [...text]
    .filter((character) => character >= ' ')
    .join('')
    .trim();
}
